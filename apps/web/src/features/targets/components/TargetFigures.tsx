import type { DistancesResponse } from '@faintward/contracts/distances';
import type { Target } from '@faintward/contracts/targets';
import Box from '@mui/material/Box';
import { formatNumber } from '../../../lib/format';
import type { QueryState } from '../../../ui/PageStates';
import { PlainTable } from '../../../ui/PlainTable';
import { distanceQuantity, explainDistance } from '../../../ui/distanceQuantities';
import { Explained, Quantity } from '../../../ui/Quantity';

/** Of all that follows from a redshift, what a target's sheet shows. */
const shown = (
  [
    'luminosityDistanceMpc',
    'distanceModulusMag',
    'angularDiameterDistanceMpc',
    'kpcPerArcsec',
    'ageGyr',
    'lookbackTimeGyr',
  ] as const
).map((field) => ({ ...distanceQuantity(field), field }));

/** Distances, scale and times in the proposal's cosmology, beside the conventional one. */
export function DistanceFigures({ target, beside }: { target: Target; beside: QueryState<DistancesResponse> }) {
  const { computed } = target;
  const conventional = beside.data?.rows[0];
  return (
    <PlainTable
      sx={{
        '& td, & th': { borderBottom: 1, borderColor: 'divider', py: 0.6, px: 1, textAlign: 'right' },
        '& tr:last-of-type td, & tbody tr:last-of-type th': { borderBottom: 0 },
        '& tbody th': { textAlign: 'left', pl: 0, fontWeight: 400 },
        '& thead th': { color: 'text.secondary', fontSize: '0.8125rem', fontWeight: 600 },
        '& .beside': { bgcolor: 'faintward.raised' },
      }}
    >
      <thead>
        <tr>
          <td />
          <th scope="col">{computed.cosmologyId}</th>
          <th scope="col" className="beside">
            {conventional ? '70 / 0.3' : beside.error ? 'not loaded' : '…'}
          </th>
        </tr>
      </thead>
      <tbody>
        {shown.map((quantity) => (
          <tr key={quantity.field}>
            <th scope="row">{quantity.label}</th>
            <td>
              <Quantity
                value={computed[quantity.field]}
                unit={quantity.unit}
                strong
                {...quantity.format}
                explanation={explainDistance(
                  quantity,
                  formatNumber(target.redshift, { significant: 6 }),
                  computed.cosmologyId,
                )}
              />
            </td>
            <td className="beside">
              <Quantity value={conventional?.[quantity.field]} unit={quantity.unit} {...quantity.format} />
            </td>
          </tr>
        ))}
      </tbody>
    </PlainTable>
  );
}

/** Hours a night that it stands high enough in the dark, month by month. */
export function HoursUp({ target }: { target: Target }) {
  const { upHoursByMonth } = target.computed;
  const longest = Math.max(...upHoursByMonth.map((month) => month.hoursPerNight), 1);
  return (
    <PlainTable
      sx={{
        '& th': { textAlign: 'left', fontWeight: 400, width: 90, py: 0.25 },
        '& .hours': { textAlign: 'right', width: 96, whiteSpace: 'nowrap' },
      }}
    >
      <thead>
        <tr>
          <th scope="col">
            <Explained
              explanation={{
                title: 'Hours up',
                meaning:
                  'Hours of a night in the middle of the month that the target stands above the altitude limit while the Sun is below −18°.',
              }}
            >
              Month
            </Explained>
          </th>
          <td aria-hidden="true" />
          <th scope="col" className="hours">
            hours a night
          </th>
        </tr>
      </thead>
      <tbody>
        {upHoursByMonth.map(({ month, hoursPerNight }) => (
          <tr key={month}>
            <th scope="row">{month}</th>
            <td aria-hidden="true">
              <Box
                sx={{
                  height: 8,
                  borderRadius: '2px',
                  bgcolor: 'primary.main',
                  width: `${(100 * hoursPerNight) / longest}%`,
                }}
              />
            </td>
            <td className="hours">{formatNumber(hoursPerNight, { decimals: 1 })}</td>
          </tr>
        ))}
      </tbody>
    </PlainTable>
  );
}
