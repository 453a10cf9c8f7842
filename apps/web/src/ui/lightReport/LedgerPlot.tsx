import Box from '@mui/material/Box';
import { useMemo, type ReactNode } from 'react';
import { formatNumber } from '../../lib/format';
import { colour } from '../../theme/theme';
import { Note } from '../Note';
import { PlotFigure, type PlotTable } from '../plot/PlotFigure';
import { useWidth } from '../plot/useWidth';
import { LedgerDrawing } from './LedgerDrawing';
import { LedgerSteps } from './LedgerSteps';
import {
  inputText,
  ledgerLayout,
  ledgerRows,
  ledgerSentence,
  stageWords,
  type LedgerAperture,
  type LedgerRow,
  type LedgerStep,
} from './ledger';

export interface LedgerPlotProps {
  steps: readonly LedgerStep[];
  title: ReactNode;
  note?: ReactNode;
  /** What is budgeted, in words: "Light budget in J". */
  what: string;
  /** Why the ledger ends where it does, where there is no light. */
  reason?: string | null;
  aperture?: LedgerAperture | null;
  fileName?: string;
}

/**
 * The light budget: each step between the source and the detector in magnitudes, bright at the left, with the running
 * total. The axis is broken at the distance modulus, so that small steps stay readable. A step opens its formula.
 */
export function LedgerPlot({
  steps,
  title,
  note,
  what,
  reason,
  aperture,
  fileName = 'light-budget.csv',
}: LedgerPlotProps) {
  const [box, width] = useWidth(720);
  const rows = useMemo(() => ledgerRows(steps, reason ? null : aperture), [steps, aperture, reason]);
  const layout = useMemo(() => ledgerLayout(rows, width), [rows, width]);
  const description = ledgerSentence(rows, what, reason ?? undefined);
  const last = steps.at(-1);
  return (
    <PlotFigure
      title={title}
      note={note ?? 'Each step in magnitudes with the running total: losses run right, gains left.'}
      description={description}
      table={tableOf(rows)}
      fileName={fileName}
    >
      <Box ref={box} sx={{ position: 'relative', minWidth: 0 }}>
        <LedgerDrawing layout={layout} width={width} description={description} isCutOff={Boolean(reason)} />
        <LedgerSteps layout={layout} width={width} what={what} />
      </Box>
      {reason && (
        <Box sx={{ mt: 1 }}>
          <Note tone="warning">The ledger stops here. {reason}</Note>
        </Box>
      )}
      {last?.stage === 'counting' && (
        <Box sx={{ mt: 1, fontSize: '0.8125rem', color: 'text.secondary' }}>
          The last total is −2.5 log<sub>10</sub> of a rate:{' '}
          <Box component="b" sx={{ color: colour.ink }}>
            {formatNumber(10 ** (-0.4 * last.totalMag), { significant: 3 })} e⁻/s
          </Box>
          .
        </Box>
      )}
    </PlotFigure>
  );
}

function tableOf(rows: readonly LedgerRow[]): PlotTable {
  return {
    header: ['Stage', 'Step', 'Change (mag)', 'Total (mag)', 'Formula', 'Inputs', 'Source'],
    fileHeader: ['stage', 'step', 'delta_mag', 'total_mag', 'formula', 'inputs', 'source'],
    rows: rows.map((row) => [
      stageWords[row.stage],
      row.title,
      row.kind === 'start' ? null : row.deltaMag,
      row.totalMag,
      row.formula ?? '',
      (row.inputs ?? []).map(inputText).join('; '),
      row.source ?? '',
    ]),
    format: (value, column) => formatNumber(value, { decimals: 3, signed: column === 2 }),
  };
}
