import type { DistanceRow } from '@faintward/contracts/distances';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import { useQueries, useQuery } from '@tanstack/react-query';
import { useMemo, useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import { distanceQueries } from '../features/distances/api/distances';
import {
  curveRedshifts,
  longestSharedText,
  readCosmology,
  readRedshifts,
  readState,
  writeState,
} from '../features/distances/calculatorState';
import { CalculatorTabs } from '../features/distances/components/CalculatorTabs';
import { CalculatorForm } from '../features/distances/components/CalculatorForm';
import { DistanceCurves } from '../features/distances/components/DistanceCurves';
import { DistanceSheet } from '../features/distances/components/DistanceSheet';
import { DistancesTable } from '../features/distances/components/DistancesTable';
import { ApiError } from '../lib/api';
import { downloadText, toCsv } from '../lib/csv';
import { counted } from '../lib/format';
import { useKeptInAddress } from '../lib/useKeptInAddress';
import { CalculatorFrame } from '../ui/calculator/CalculatorFrame';
import { distanceQuantities } from '../ui/distanceQuantities';
import { Note } from '../ui/Note';
import { Loaded } from '../ui/PageStates';
import { Panel } from '../ui/Panel';

export function Component() {
  const [address] = useSearchParams();
  const [state, setState] = useState(() => readState(address));
  const [opened, setOpened] = useState(0);
  const settled = useKeptInAddress(state, writeState, 350);

  const redshifts = useMemo(() => readRedshifts(settled.redshiftText), [settled.redshiftText]);
  const cosmology = useMemo(() => readCosmology(settled), [settled]);
  const asked = useMemo(() => redshifts.value ?? [], [redshifts]);
  const grid = useMemo(() => curveRedshifts(asked), [asked]);
  const model = cosmology.value ?? 'planck18';
  const canAsk = redshifts.value !== undefined && cosmology.value !== undefined;
  const compares = settled.compare && model !== 'conv70';

  const presets = useQuery(distanceQueries.presets());
  const main = useQuery({ ...distanceQueries.rows(model, asked), enabled: canAsk });
  const beside = useQuery({ ...distanceQueries.rows('conv70', asked), enabled: canAsk && compares });
  const curve = useQuery({ ...distanceQueries.rows(model, grid), enabled: canAsk });
  const besideCurves = useQueries({
    queries: settled.beside
      .filter((id) => id !== model)
      .map((id) => ({ ...distanceQueries.rows(id, grid), enabled: canAsk })),
  });

  const errors: Record<string, string | undefined> = {
    ...redshifts.errors,
    ...cosmology.errors,
    ...fieldMessages(main.error, asked),
  };
  const besideRows = compares ? beside.data : undefined;

  return (
    <CalculatorFrame
      title="Distances and dimming"
      actions={
        <Button
          variant="contained"
          disabled={!main.data}
          onClick={() => main.data && downloadText('distances.csv', tableText(main.data.rows, besideRows?.rows))}
        >
          Download CSV
        </Button>
      }
      below={<CalculatorTabs part="distances" />}
    >
      <Box
        sx={{
          display: 'grid',
          gap: 3,
          gridTemplateColumns: { xs: 'minmax(0, 1fr)', lg: 'minmax(0, 5fr) minmax(0, 8fr)' },
          alignItems: 'start',
        }}
      >
        <Box sx={{ position: { lg: 'sticky' }, top: 16 }}>
          <Panel title="What goes in">
            <CalculatorForm state={state} errors={errors} presets={presets.data?.rows ?? []} onChange={setState} />
            {state.redshiftText.length > longestSharedText && (
              <Box sx={{ mt: 2 }}>
                <Note>This list is too long for a link: only the cosmology is kept in the address.</Note>
              </Box>
            )}
          </Panel>
        </Box>
        <Stack sx={{ gap: 3, minWidth: 0 }}>
          <Panel>
            <Loaded query={curve} what="The curves">
              {(data) => (
                <>
                  <DistanceCurves
                    models={[data, ...besideCurves.flatMap((beside) => beside.data ?? [])]}
                    rows={main.data?.rows ?? []}
                    presets={presets.data?.rows ?? []}
                    state={state}
                    chosenId={state.cosmology}
                    onChange={(change) => setState((old) => ({ ...old, ...change }))}
                  />
                  {besideCurves.some((beside) => beside.isError) && (
                    <Note tone="warning">A cosmology beside the chosen one could not be loaded.</Note>
                  )}
                </>
              )}
            </Loaded>
          </Panel>
          <Loaded query={main} what="The distances">
            {(data) => {
              const index = Math.min(opened, data.rows.length - 1);
              const row = data.rows[index];
              return (
                <Stack sx={{ gap: 3 }}>
                  {data.notices.map((notice) => (
                    <Note key={notice.code} tone={notice.severity}>
                      {notice.message}
                    </Note>
                  ))}
                  {row && (
                    <Panel
                      title={`At z = ${String(row.redshift).replace('-', '−')}`}
                      note={
                        data.rows.length > 1
                          ? `${counted(data.rows.length, 'redshift')}; choose a row of the table below to see it here`
                          : `engine ${data.engineVersion}`
                      }
                    >
                      <DistanceSheet
                        row={row}
                        modelTitle={data.cosmology.title}
                        beside={besideRows?.rows[index]}
                        besideTitle={besideRows?.cosmology.title}
                      />
                    </Panel>
                  )}
                </Stack>
              );
            }}
          </Loaded>
        </Stack>
      </Box>
      {main.data && main.data.rows.length > 1 && (
        <Box sx={{ mt: 3 }}>
          <DistancesTable rows={main.data.rows} onOpen={setOpened} />
        </Box>
      )}
    </CalculatorFrame>
  );
}

/** The server counts redshifts from 0 (`redshifts.3`); people read their own text. */
function fieldMessages(error: unknown, redshifts: readonly number[]): Record<string, string> {
  if (!(error instanceof ApiError)) return {};
  const messages: Record<string, string> = {};
  for (const { path, message } of error.fieldErrors) {
    const [head, tail] = path.split('.');
    const index = Number(tail);
    if (head === 'redshifts') {
      const which =
        tail !== undefined && redshifts[index] !== undefined ? `No. ${index + 1}, ${redshifts[index]}: ` : '';
      messages['redshiftText'] ??= which + message;
    } else messages[head === 'cosmology' && tail ? tail : (head ?? 'cosmology')] ??= message;
  }
  return messages;
}

function tableText(rows: readonly DistanceRow[], beside: readonly DistanceRow[] | undefined): string {
  const fields = distanceQuantities.map((quantity) => quantity.field);
  return toCsv(
    ['redshift', ...fields, ...(beside ? fields.map((field) => `${field}_conv70`) : [])],
    rows.map((row, index) => [
      row.redshift,
      ...fields.map((field) => row[field]),
      ...(beside ? fields.map((field) => beside[index]?.[field]) : []),
    ]),
  );
}
