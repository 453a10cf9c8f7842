import type { Estimate, FeasibleEstimate } from '@faintward/contracts/estimates';
import Box from '@mui/material/Box';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { formatDuration, formatNumber } from '../../lib/format';
import { colour } from '../../theme/theme';
import { LightBudget } from '../LightBudget';
import { Note } from '../Note';
import { Panel } from '../Panel';
import { PlainTable } from '../PlainTable';
import { Quantity } from '../Quantity';

const perWords = {
  aperture: 'in the aperture',
  arcsec2: 'per square arcsecond',
  pixel: 'per pixel',
  resolutionElement: 'per resolution element',
};
const limitWords = {
  source: 'the source’s own photons',
  sky: 'the sky',
  dark: 'the dark current',
  readNoise: 'the read-out',
};

/** An estimate, whole: the answer, where the light went, what time it takes and what bounds it. */
export function EstimateView({ estimate }: { estimate: Estimate }) {
  return (
    <Stack sx={{ gap: 3 }}>
      <Panel>
        {estimate.outcome === 'feasible' ? (
          <Answer estimate={estimate} />
        ) : (
          <>
            <Typography variant="body2" color="textSecondary">
              Not feasible
            </Typography>
            <Typography variant="h2" component="p" sx={{ my: 0.5 }}>
              {estimate.reason.message}
            </Typography>
            <Typography variant="body2" color="textSecondary">
              There is no exposure time that reaches this goal. The ledger below shows how far the light comes.
            </Typography>
          </>
        )}
        {estimate.notices.length > 0 && (
          <Stack sx={{ gap: 1, mt: 2 }}>
            {estimate.notices.map((notice) => (
              <Note key={`${notice.code} ${notice.message}`} tone={notice.severity}>
                {notice.message}
              </Note>
            ))}
          </Stack>
        )}
      </Panel>
      {estimate.steps.length > 0 && (
        <Panel title="Light budget">
          <LightBudget steps={estimate.steps} />
        </Panel>
      )}
      {estimate.outcome === 'feasible' && (
        <Box
          sx={{
            display: 'grid',
            gap: 3,
            gridTemplateColumns: { xs: 'minmax(0, 1fr)', sm: 'repeat(2, minmax(0, 1fr))' },
          }}
        >
          <Panel title="Time">
            <Ledger
              rows={[
                [
                  `Open shutter, ${estimate.exposureCount} × ${formatDuration(estimate.exposureSeconds)}`,
                  estimate.openShutterSeconds,
                ],
                ...estimate.overheads.map(
                  (overhead) =>
                    [
                      overhead.count > 1
                        ? `${overhead.title}, ${formatNumber(overhead.count, { decimals: 0 })} ×`
                        : overhead.title,
                      overhead.seconds,
                    ] as const,
                ),
              ]}
              total={estimate.totalSeconds}
            />
          </Panel>
          <Panel title="What limits it" note={`Chiefly ${limitWords[estimate.limitedBy]}.`}>
            <NoiseShares estimate={estimate} />
            <Box component="ul" sx={{ pl: 2.25, my: 1.5, fontSize: '0.875rem' }}>
              {estimate.exposureBounds.map((bound) => (
                <li key={bound.id}>
                  {bound.side === 'upper' ? 'at most ' : 'at least '}
                  {formatDuration(bound.seconds)}: {bound.reason}
                </li>
              ))}
            </Box>
          </Panel>
          <Panel title="Counts" sx={{ gridColumn: { sm: '1 / -1' } }}>
            <Box
              component="dl"
              sx={{ display: 'grid', gridTemplateColumns: 'repeat(auto-fit, minmax(190px, 1fr))', gap: 2, m: 0 }}
            >
              <Datum label="Source" value={estimate.rates.sourceElectronsPerSecond} unit="e⁻/s" />
              <Datum label="Sky" value={estimate.rates.skyElectronsPerSecond} unit="e⁻/s" />
              <Datum label="Dark current" value={estimate.rates.darkElectronsPerSecond} unit="e⁻/s" />
              <Datum label="Brightest pixel" value={estimate.peakElectronsPerPixel} unit="e⁻" />
              <Datum label="Apparent magnitude" value={estimate.apparentMagnitudeAb} unit="AB" decimals={2} />
              <Datum label="In the aperture" value={estimate.apertureMagnitudeAb} unit="AB" decimals={2} />
              <Datum label="Image quality, FWHM" value={estimate.fwhmArcsec} unit="″" decimals={2} />
              <Datum label="Area" value={estimate.aperture.areaArcsec2} unit="″²" decimals={2} />
              <Datum label="Light enclosed" value={100 * estimate.aperture.enclosedFraction} unit="%" decimals={0} />
              <Datum label="Pixels" value={estimate.aperture.pixelCount} unit="" decimals={1} />
              <Datum label="Wavelength" value={estimate.wavelengthNm} unit="nm" decimals={1} />
            </Box>
          </Panel>
        </Box>
      )}
      <Typography variant="body2" color="textSecondary">
        A planning figure, to be confirmed by the observatory’s instrument team. {estimate.cosmologyId}, engine{' '}
        {estimate.engineVersion}, inputs <code>{estimate.inputHash.slice(0, 12)}</code>.
      </Typography>
    </Stack>
  );
}

function Answer({ estimate }: { estimate: FeasibleEstimate }) {
  return (
    <Box sx={{ display: 'flex', gap: { xs: 2, sm: 5 }, flexWrap: 'wrap' }} aria-live="polite">
      <Big label="With overheads" value={formatDuration(estimate.totalSeconds)} />
      <Big
        label="Exposures"
        value={`${formatNumber(estimate.exposureCount, { decimals: 0 })} × ${formatDuration(estimate.exposureSeconds)}`}
      />
      <Big
        label={`S/N ${perWords[estimate.signalToNoisePer]}`}
        value={formatNumber(estimate.signalToNoise, { significant: 3 })}
      />
    </Box>
  );
}

function Big({ label, value }: { label: string; value: string }) {
  return (
    <Box>
      <Typography variant="body2" color="textSecondary">
        {label}
      </Typography>
      <Typography sx={{ fontSize: '1.625rem', fontWeight: 600, lineHeight: 1.25, whiteSpace: 'nowrap' }}>
        {value}
      </Typography>
    </Box>
  );
}

function Datum({
  label,
  value,
  unit,
  decimals,
}: {
  label: string;
  value: number | null;
  unit: string;
  decimals?: number;
}) {
  return (
    <div>
      <Typography variant="body2" color="textSecondary" component="dt">
        {label}
      </Typography>
      <dd>
        <Quantity value={value} unit={unit} {...(decimals === undefined ? { significant: 3 } : { decimals })} />
      </dd>
    </div>
  );
}

function Ledger({ rows, total }: { rows: readonly (readonly [string, number])[]; total: number }) {
  return (
    <PlainTable
      sx={{
        '& th': { textAlign: 'left', fontWeight: 400, py: 0.5 },
        '& td': { textAlign: 'right', whiteSpace: 'nowrap' },
        '& tfoot th, & tfoot td': { borderTop: 1, borderColor: 'text.secondary', fontWeight: 600, pt: 0.75 },
      }}
    >
      <tbody>
        {rows.map(([label, seconds]) => (
          <tr key={label}>
            <th scope="row">{label}</th>
            <td>{formatDuration(seconds)}</td>
          </tr>
        ))}
      </tbody>
      <tfoot>
        <tr>
          <th scope="row">Total</th>
          <td>{formatDuration(total)}</td>
        </tr>
      </tfoot>
    </PlainTable>
  );
}

function shareText(share: number): string {
  if (share > 0 && share < 0.0005) return '< 0.1';
  return formatNumber(100 * share, { decimals: share > 0 && share < 0.01 ? 1 : 0 });
}

/** Shares of the noise variance, as one bar with its numbers written beside. */
function NoiseShares({ estimate }: { estimate: FeasibleEstimate }) {
  const shares = [
    ['source', estimate.noiseShares.source, colour.primary],
    ['sky', estimate.noiseShares.sky, colour.accent],
    ['dark', estimate.noiseShares.dark, colour.inkSoft],
    ['read-out', estimate.noiseShares.readNoise, colour.edge],
  ] as const;
  return (
    <Box>
      <Box aria-hidden="true" sx={{ display: 'flex', height: 12, gap: '2px' }}>
        {shares.map(([label, share, fill]) =>
          share > 0 ? <Box key={label} sx={{ width: `${100 * share}%`, background: fill }} /> : null,
        )}
      </Box>
      <Typography variant="body2" component="div" sx={{ mt: 0.5, display: 'flex', gap: 2, flexWrap: 'wrap' }}>
        {shares.map(([label, share, fill]) => (
          <span key={label} style={{ display: 'inline-flex', gap: 6, alignItems: 'center' }}>
            <span aria-hidden="true" style={{ width: 8, height: 8, background: fill }} />
            {label} {shareText(share)} %
          </span>
        ))}
        <span style={{ color: colour.inkSoft }}>of the noise variance</span>
      </Typography>
    </Box>
  );
}
