import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import { useQuery } from '@tanstack/react-query';
import { useMemo, useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import { lightReportQueries } from '../features/distances/api/light';
import { CalculatorTabs } from '../features/distances/components/CalculatorTabs';
import { SourceForm } from '../features/distances/components/SourceForm';
import {
  readSource,
  sourceFieldOf,
  toLightRequest,
  writeSource,
  type DistributionTable,
  type SourceErrors,
} from '../features/distances/source';
import { ApiError } from '../lib/api';
import { downloadText } from '../lib/csv';
import { useKeptInAddress } from '../lib/useKeptInAddress';
import { CalculatorFrame } from '../ui/calculator/CalculatorFrame';
import { IncompleteNote } from '../ui/calculator/IncompleteNote';
import { reportCsv } from '../ui/lightReport/reportCsv';
import { LightReportView } from '../ui/lightReport/LightReportView';
import { Note } from '../ui/Note';
import { Loaded } from '../ui/PageStates';
import { Panel } from '../ui/Panel';

/** One source: what its light does on the way, without an account and shareable by its address. */
export function Component() {
  const [address] = useSearchParams();
  const [state, setState] = useState(() => readSource(address));
  const [table, setTable] = useState<DistributionTable>(null);
  const settled = useKeptInAddress(state, writeSource, 400);
  const { request, errors } = useMemo(() => toLightRequest(settled, table), [settled, table]);

  const report = useQuery(lightReportQueries.one(request));
  const shownErrors: SourceErrors = { ...errors };
  if (request && report.error instanceof ApiError) {
    for (const { path, message } of report.error.fieldErrors) {
      const field = sourceFieldOf(path, settled, table);
      if (field) shownErrors[field] ??= message;
    }
  }
  const isIncomplete = request === undefined;

  return (
    <CalculatorFrame
      title="The light of a source"
      actions={
        <Button
          variant="contained"
          disabled={!report.data}
          onClick={() => report.data && downloadText('light.csv', reportCsv(report.data))}
        >
          Download CSV
        </Button>
      }
      below={<CalculatorTabs part="source" />}
    >
      <Box
        sx={{
          display: 'grid',
          gap: 3,
          gridTemplateColumns: { xs: 'minmax(0, 1fr)', md: 'minmax(0, 5fr) minmax(0, 9fr)' },
          alignItems: 'start',
        }}
      >
        <Panel title="The source">
          <SourceForm
            state={state}
            table={table}
            errors={shownErrors}
            onChange={(change) => setState((old) => ({ ...old, ...change }))}
            onTableChange={setTable}
          />
          {state.uncertainty === 'table' && (
            <Box sx={{ mt: 2 }}>
              <Note>The table p(z) is too long for a link: whoever opens it has to paste it again.</Note>
            </Box>
          )}
        </Panel>
        <Stack sx={{ gap: 2, minWidth: 0 }}>
          {isIncomplete && <IncompleteNote hasAnswer={report.data !== undefined} />}
          {(request !== undefined || report.data) && (
            <Loaded query={report} what="The report">
              {(data) => (
                <LightReportView
                  report={data}
                  onBandChange={(ledgerBand) => setState((old) => ({ ...old, ledgerBand }))}
                />
              )}
            </Loaded>
          )}
        </Stack>
      </Box>
    </CalculatorFrame>
  );
}
