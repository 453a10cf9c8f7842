import type { DistanceRow } from '@faintward/contracts/distances';
import Box from '@mui/material/Box';
import { Fragment } from 'react';
import { formatNumber } from '../../../lib/format';
import { distanceQuantities, explainDistance } from '../../../ui/distanceQuantities';
import { PlainTable } from '../../../ui/PlainTable';
import { Explained, Quantity } from '../../../ui/Quantity';

/** Everything about one redshift, in the chosen model and in the one beside it. */
export function DistanceSheet({
  row,
  modelTitle,
  beside,
  besideTitle,
}: {
  row: DistanceRow;
  modelTitle: string;
  beside: DistanceRow | undefined;
  besideTitle: string | undefined;
}) {
  const groups = [...new Set(distanceQuantities.map((quantity) => quantity.group))];
  return (
    <PlainTable
      sx={{
        '& td, & th': { borderBottom: 1, borderColor: 'divider', py: 0.7, px: 1, textAlign: 'right' },
        '& th:first-of-type': { textAlign: 'left', pl: 0, fontWeight: 400 },
        '& thead th': { color: 'text.secondary', fontSize: '0.8125rem', fontWeight: 600, verticalAlign: 'bottom' },
        '& .group th': { fontWeight: 600, color: 'text.secondary', fontSize: '0.8125rem', pt: 1.75 },
        '& .beside': { bgcolor: 'faintward.raised' },
        // On a phone two columns of long numbers only fit with their units beneath.
        '& td > span': { whiteSpace: { xs: 'normal', sm: 'nowrap' } },
        '& td > span > span': { display: { xs: 'block', sm: 'inline' } },
      }}
    >
      <thead>
        <tr>
          <th scope="col">Quantity</th>
          <th scope="col">{modelTitle}</th>
          {beside && (
            <>
              <th scope="col" className="beside">
                {besideTitle}
              </th>
              <Box component="th" scope="col" className="beside" sx={{ display: { xs: 'none', sm: 'table-cell' } }}>
                difference
              </Box>
            </>
          )}
        </tr>
      </thead>
      <tbody>
        {groups.map((group) => (
          <Fragment key={group}>
            <tr className="group">
              <th scope="colgroup" colSpan={beside ? 4 : 2}>
                {group}
              </th>
            </tr>
            {distanceQuantities
              .filter((quantity) => quantity.group === group)
              .map((quantity) => {
                const value = row[quantity.field];
                const other = beside?.[quantity.field];
                return (
                  <tr key={quantity.field}>
                    <th scope="row">
                      <Explained
                        explanation={explainDistance(quantity, String(row.redshift).replace('-', '−'), modelTitle)}
                      >
                        {quantity.label}
                      </Explained>
                    </th>
                    <td>
                      <Quantity value={value} unit={quantity.unit} strong {...quantity.format} />
                    </td>
                    {beside && (
                      <>
                        <td className="beside">
                          <Quantity value={other} unit={quantity.unit} {...quantity.format} />
                        </td>
                        <Box component="td" className="beside" sx={{ display: { xs: 'none', sm: 'table-cell' } }}>
                          {difference(other, value, quantity.unit)}
                        </Box>
                      </>
                    )}
                  </tr>
                );
              })}
          </Fragment>
        ))}
      </tbody>
    </PlainTable>
  );
}

/** Magnitudes differ by magnitudes, all else in per cent of the chosen model. */
function difference(other: number | null | undefined, value: number | null, unit: string): string {
  if (other == null || value == null) return formatNumber(null);
  if (unit.startsWith('mag')) return `${formatNumber(other - value, { decimals: 3, signed: true })} mag`;
  if (value === 0) return formatNumber(null);
  return `${formatNumber((100 * (other - value)) / value, { decimals: 2, signed: true })} %`;
}
