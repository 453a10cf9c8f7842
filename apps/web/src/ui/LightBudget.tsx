import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import type { ReactNode } from 'react';
import { downloadText, toCsv } from '../lib/csv';
import { formatNumber } from '../lib/format';
import { colour } from '../theme/theme';
import { Explained } from './Quantity';
import { visuallyHidden } from './visuallyHidden';
import { useWidth } from './plot/useWidth';

/** One line of the ledger, as the server gives it. */
export interface BudgetStep {
  id: string;
  title: string;
  deltaMag: number;
  totalMag: number;
  formula?: string;
  inputs?: readonly { name: string; value: number; unit: string }[];
  source?: string;
}

/** Steps longer than this break the axis, so that the small ones stay readable. */
const breakBeyondMag = 8;

/** Where each running total lies, as a share of the width; with a break inside the one long step. */
export function budgetPositions(totals: readonly number[]): {
  share: (mag: number) => number;
  breakAfter: number | undefined;
} {
  const steps = totals.slice(1).map((total, index) => Math.abs(total - totals[index]!));
  const longest = Math.max(0, ...steps);
  const spread = (values: readonly number[], from: number, to: number, pad: number) => {
    const low = Math.min(...values) - pad;
    const high = Math.max(...values) + pad;
    return { low, high, share: (mag: number) => from + ((mag - low) / (high - low || 1)) * (to - from) };
  };
  if (longest <= breakBeyondMag) {
    const whole = spread(totals, 0, 1, 0.3);
    return { share: whole.share, breakAfter: undefined };
  }
  const breakAfter = steps.indexOf(longest);
  const before = spread(totals.slice(0, breakAfter + 1), 0, 0.16, 0.5);
  const after = spread(totals.slice(breakAfter + 1), 0.26, 1, 0.3);
  const middle = (totals[breakAfter]! + totals[breakAfter + 1]!) / 2;
  return { share: (mag) => (mag < middle ? before : after).share(mag), breakAfter };
}

/**
 * The light budget: every step between the source and the counted electrons, in magnitudes, with the running total.
 * Losses go right in the accent, gains left in green; the sign beside them says the same. The table is the plot.
 */
export function LightBudget({
  steps,
  title,
  fileName = 'light-budget.csv',
}: {
  steps: readonly BudgetStep[];
  title?: ReactNode;
  fileName?: string;
}) {
  const [box, width] = useWidth(260);
  const { share, breakAfter } = budgetPositions(steps.map((step) => step.totalMag));
  const at = (mag: number) => share(mag) * (width - 8) + 4;
  const rowHeight = 30;
  const gap = width < 140 ? 3 : 7;
  return (
    <Box component="figure" sx={{ minWidth: 0 }}>
      <Box component="figcaption" sx={{ display: 'flex', alignItems: 'baseline', gap: 1 }}>
        <Box sx={{ flex: 1, fontSize: '0.8125rem', color: 'text.secondary' }}>
          {title}
          Each step in magnitudes with the running total; losses run right, gains left.
        </Box>
        <Button
          size="small"
          variant="text"
          onClick={() =>
            downloadText(
              fileName,
              toCsv(
                ['step', 'delta_mag', 'total_mag_ab', 'formula', 'source'],
                steps.map((step) => [step.title, step.deltaMag, step.totalMag, step.formula, step.source]),
              ),
            )
          }
        >
          CSV
        </Button>
      </Box>
      <Box
        component="table"
        sx={{
          width: '100%',
          // Fixed, so that the bars take the room that the names and numbers leave, and never the other way round.
          tableLayout: 'fixed',
          borderCollapse: 'collapse',
          fontSize: '0.8125rem',
          '& td, & th': { p: 0, whiteSpace: 'nowrap' },
          '& th': { fontWeight: 400, textAlign: 'left' },
          '& thead th, & td': { textAlign: 'right', pl: 1.5 },
          '& thead th': { color: 'text.secondary' },
          '& .bars': { pl: { xs: 0, sm: 2 }, textAlign: 'left', overflow: 'hidden' },
          '& .step': { width: { xs: 'auto', sm: 64 } },
          '& .total': { width: { xs: 'auto', sm: 76 } },
          // On a phone the bar stands below its name and numbers, as wide as the sheet.
          '& tr': {
            display: { xs: 'grid', sm: 'table-row' },
            gridTemplateColumns: 'minmax(0, 1fr) 62px 62px',
            pt: { xs: 0.75, sm: 0 },
          },
          '& td, & thead th, & tbody th': { height: { xs: 'auto', sm: rowHeight } },
          '& th:first-of-type': { gridArea: '1 / 1' },
          '& .step, & .total': { gridRow: 1 },
          '& td.bars': { gridArea: '2 / 1 / 3 / -1' },
        }}
        role="table"
      >
        <thead role="rowgroup">
          <tr role="row">
            <Box
              component="th"
              scope="col"
              role="columnheader"
              sx={{ textAlign: 'left !important', pl: '0 !important', width: { xs: 'auto', sm: '36%' } }}
            >
              from the source to the detector
            </Box>
            <td className="bars" aria-hidden="true">
              <div ref={box} />
            </td>
            <th scope="col" role="columnheader" className="step">
              step
            </th>
            <th scope="col" role="columnheader" className="total">
              total
              <span style={visuallyHidden}>, AB magnitude</span>
            </th>
          </tr>
        </thead>
        <tbody role="rowgroup">
          {steps.map((step, index) => {
            const from = index === 0 ? step.totalMag : steps[index - 1]!.totalMag;
            const low = at(Math.min(from, step.totalMag));
            const high = at(Math.max(from, step.totalMag));
            const isBroken = breakAfter === index - 1 && index > 0;
            const middle = 0.21 * (width - 8) + 4;
            return (
              <tr key={step.id} role="row">
                <Box
                  component="th"
                  scope="row"
                  role="rowheader"
                  sx={{ whiteSpace: 'normal !important', lineHeight: 1.25 }}
                >
                  {step.formula || step.source ? (
                    <Explained
                      explanation={{
                        title: step.title,
                        ...(step.formula ? { formula: step.formula } : {}),
                        inputs: (step.inputs ?? []).map((input) => ({
                          label: input.name,
                          value: `${formatNumber(input.value)} ${input.unit}`,
                        })),
                        ...(step.source ? { source: step.source } : {}),
                      }}
                    >
                      {step.title}
                    </Explained>
                  ) : (
                    step.title
                  )}
                </Box>
                <td className="bars" aria-hidden="true">
                  <svg width={width} height={rowHeight} style={{ display: 'block', overflow: 'visible' }}>
                    {index < steps.length - 1 && (
                      <line
                        x1={at(step.totalMag)}
                        x2={at(step.totalMag)}
                        y1="22"
                        y2={rowHeight + 8}
                        stroke={colour.inkSoft}
                        strokeDasharray="2 2"
                      />
                    )}
                    <rect
                      x={index === 0 ? low - 2 : low}
                      y="8"
                      width={Math.max(index === 0 ? 4 : 2, high - low)}
                      height="14"
                      rx="2"
                      fill={index === 0 ? colour.primary : step.deltaMag < 0 ? colour.good : colour.accent}
                      fillOpacity={index === 0 ? 1 : 0.85}
                    />
                    {isBroken && (
                      <path
                        d={`M${middle - gap} 5 l${gap / 2} 20 h${gap} l${-gap / 2} -20 Z`}
                        fill={colour.surface}
                        stroke="none"
                      />
                    )}
                    {isBroken && (
                      <path
                        d={`M${middle - gap} 5 l${gap / 2} 20 M${middle} 5 l${gap / 2} 20`}
                        stroke={colour.inkSoft}
                        fill="none"
                      />
                    )}
                  </svg>
                </td>
                <td role="cell" className="step">
                  {index === 0 ? '' : formatNumber(step.deltaMag, { decimals: 2, signed: true })}
                </td>
                <td role="cell" className="total" style={{ fontWeight: 600 }}>
                  {formatNumber(step.totalMag, { decimals: 2 })}
                </td>
              </tr>
            );
          })}
        </tbody>
      </Box>
    </Box>
  );
}
