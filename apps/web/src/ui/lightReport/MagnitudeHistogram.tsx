import type { LightUncertainty, Quantiles } from '@faintward/contracts/light-report';
import { colour } from '../../theme/theme';
import { AxisBelow, AxisBeside } from '../plot/Axes';
import { PlotFigure } from '../plot/PlotFigure';
import { makeScale } from '../plot/scale';
import { useWidth } from '../plot/useWidth';
import { quantilesText } from './uncertainty';

const height = 240;
const margin = { left: 62, right: 16, top: 12, bottom: 46 };

/** The magnitudes drawn, bright at the left. */
export function MagnitudeHistogram({
  histogram: { edges, counts },
  quantiles,
  label,
}: {
  histogram: LightUncertainty['magnitudeHistogram'];
  quantiles: Quantiles | null;
  label: string;
}) {
  const [box, width] = useWidth(480);
  const total = counts.reduce((sum, count) => sum + count, 0);
  const shares = counts.map((count) => (100 * count) / total);
  const right = width - margin.right;
  const bottom = height - margin.bottom;
  const x = makeScale(
    'linear',
    [edges[0] ?? 0, edges.at(-1) ?? 1],
    [margin.left, right],
    Math.max(2, Math.floor((right - margin.left) / 60)),
  );
  const y = makeScale('linear', [0, Math.max(...shares, 1) * 1.08], [bottom, margin.top], 4);
  const description = `Magnitudes drawn in ${label}${quantiles ? `: ${quantilesText(quantiles, 2)} AB` : ''}`;
  return (
    <PlotFigure
      title={`Magnitude in ${label}`}
      note="Part of the draws that have light; dashed: the 16th, 50th and 84th percentile"
      description={description}
      table={{
        header: ['From (AB)', 'To (AB)', 'Draws', 'Part (%)'],
        fileHeader: ['from_ab', 'to_ab', 'draws', 'percent'],
        rows: counts.map((count, index) => [
          edges[index] ?? null,
          edges[index + 1] ?? null,
          count,
          shares[index] ?? null,
        ]),
      }}
      fileName="magnitudes.csv"
      box={box}
    >
      <svg
        width={width}
        height={height}
        role="img"
        aria-label={description}
        style={{ display: 'block', overflow: 'visible' }}
      >
        <AxisBeside
          axis={{ label: 'part of the draws', unit: '%' }}
          scale={y}
          left={margin.left}
          right={right}
          top={margin.top}
          bottom={bottom}
        />
        {counts.map((count, index) => {
          const from = edges[index];
          const to = edges[index + 1];
          if (from === undefined || to === undefined || count === 0) return null;
          const level = y(shares[index]!);
          return (
            <rect
              key={from}
              x={x(from) + 0.5}
              width={Math.max(1, x(to) - x(from) - 1)}
              y={level}
              height={bottom - level}
              fill={colour.primary}
              fillOpacity="0.75"
            />
          );
        })}
        {quantiles &&
          [quantiles.p16, quantiles.p50, quantiles.p84].map((value, index) => (
            <line
              key={index}
              x1={x(value)}
              x2={x(value)}
              y1={margin.top}
              y2={bottom}
              stroke={colour.accent}
              strokeWidth={index === 1 ? 2 : 1}
              strokeDasharray="5 4"
            />
          ))}
        <AxisBelow
          axis={{ label: 'AB magnitude, faint at the right' }}
          scale={x}
          left={margin.left}
          right={right}
          y={bottom}
          titleY={height - 8}
        />
      </svg>
    </PlotFigure>
  );
}
