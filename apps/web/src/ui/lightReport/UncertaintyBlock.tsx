import type { LightUncertainty } from '@faintward/contracts/light-report';
import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import { formatNumber } from '../../lib/format';
import { colour } from '../../theme/theme';
import { textWidth } from '../plot/labels';
import { PlotFrame } from '../plot/PlotFrame';
import { LineOddsTable } from './LineOddsTable';
import { MagnitudeHistogram } from './MagnitudeHistogram';
import {
  decimalsFor,
  mostLinesInWords,
  percentText,
  quantilesText,
  shownRange,
  uncertaintySentences,
} from './uncertainty';
import { PlotText } from '../plot/PlotText';

/** How well the redshift is known, and what that makes of lines and magnitudes. */
export function UncertaintyBlock({
  uncertainty,
  bandLabel,
}: {
  uncertainty: LightUncertainty;
  bandLabel: string | null;
}) {
  const { distribution, redshift, magnitudeHistogram } = uncertainty;
  const range = shownRange(distribution);
  const decimals = decimalsFor(redshift);
  const peakText = distribution.peaks
    .map((peak) => `${percentText(peak.probability)} near ${formatNumber(peak.redshift, { decimals: 2 })}`)
    .join(', ');
  const shown = distribution.redshifts.flatMap((x, index) =>
    x >= range[0] && x <= range[1] ? [{ x, y: distribution.densities[index] ?? null }] : [],
  );
  const hasHistogram = magnitudeHistogram.counts.some((count) => count > 0);
  return (
    <>
      <Box component="ul" sx={{ m: 0, mb: 2, pl: 2.25 }}>
        <li>
          Redshift {quantilesText(redshift)}
          {distribution.peaks.length > 1 && `: ${distribution.peaks.length} peaks, ${peakText}`}.
        </li>
        {uncertaintySentences(uncertainty, bandLabel).map((sentence) => (
          <li key={sentence}>{sentence}</li>
        ))}
      </Box>
      <Box
        sx={{
          display: 'grid',
          gap: 3,
          gridTemplateColumns: hasHistogram
            ? { xs: 'minmax(0, 1fr)', md: 'repeat(2, minmax(0, 1fr))' }
            : 'minmax(0, 1fr)',
        }}
      >
        <PlotFrame
          title="Redshift"
          note="Probability density; dashed: the 16th, 50th and 84th percentile"
          description={`Distribution of the redshift: ${quantilesText(redshift)}; ${peakText}`}
          x={{ label: 'redshift', domain: range }}
          y={{ label: 'density', unit: 'per unit z' }}
          series={[{ kind: 'line', label: 'p(z)', values: shown, showLabel: false }]}
          fileName="redshift-distribution.csv"
          height={240}
        >
          {({ x, y, height }) => {
            const bottom = height - 46;
            const most = Math.max(...shown.map((point) => point.y ?? 0));
            const peaks = distribution.peaks.filter((peak) => peak.redshift >= range[0] && peak.redshift <= range[1]);
            return (
              <>
                {[redshift.p16, redshift.p50, redshift.p84].map((value, index) => (
                  <line
                    key={index}
                    x1={x(value)}
                    x2={x(value)}
                    y1={y(most)}
                    y2={bottom}
                    stroke={colour.accent}
                    strokeWidth={index === 1 ? 2 : 1}
                    strokeDasharray="5 4"
                  />
                ))}
                <PercentileLabels
                  labels={[redshift.p16, redshift.p50, redshift.p84].map((value) => ({
                    at: x(value),
                    text: formatNumber(value, { decimals }),
                  }))}
                  y={bottom - 6}
                />
                {peaks.length > 1 &&
                  peaks.map((peak) => (
                    <PlotText
                      key={peak.redshift}
                      x={x(peak.redshift)}
                      y={y(densityAt(shown, peak.redshift)) - 8}
                      textAnchor="middle"
                    >
                      {percentText(peak.probability)}
                    </PlotText>
                  ))}
              </>
            );
          }}
        </PlotFrame>
        {hasHistogram && (
          <MagnitudeHistogram
            histogram={magnitudeHistogram}
            quantiles={uncertainty.magnitudeAb}
            label={bandLabel ?? 'the magnitude'}
          />
        )}
      </Box>
      {uncertainty.lines.length > mostLinesInWords && (
        <Box sx={{ mt: 2 }}>
          <LineOddsTable lines={uncertainty.lines} bandLabel={bandLabel} />
        </Box>
      )}
      <Typography variant="body2" color="textSecondary" sx={{ mt: 1.5 }}>
        {formatNumber(uncertainty.sampleCount, { decimals: 0 })} draws, seed {uncertainty.seed}. Probabilities are good
        to about {formatNumber(100 * uncertainty.probabilityError, { significant: 1 })} % by their number.
      </Typography>
    </>
  );
}

/** Numbers at the foot of their lines; left out where they would touch. */
function PercentileLabels({ labels, y }: { labels: readonly { at: number; text: string }[]; y: number }) {
  const [low, middle, high] = labels;
  if (!low || !middle || !high) return null;
  const room = textWidth(middle.text) / 2 + textWidth(low.text) + 10;
  const shown = [
    ...(middle.at - low.at > room ? [{ ...low, anchor: 'end' as const, shift: -4 }] : []),
    { ...middle, anchor: 'middle' as const, shift: 0 },
    ...(high.at - middle.at > room ? [{ ...high, anchor: 'start' as const, shift: 4 }] : []),
  ];
  return (
    <>
      {shown.map((label) => (
        <PlotText key={label.text} x={label.at + label.shift} y={y} textAnchor={label.anchor}>
          {label.text}
        </PlotText>
      ))}
    </>
  );
}

function densityAt(points: readonly { x: number; y: number | null }[], redshift: number): number {
  const nearest = points.toSorted((a, b) => Math.abs(a.x - redshift) - Math.abs(b.x - redshift))[0];
  return nearest?.y ?? 0;
}
