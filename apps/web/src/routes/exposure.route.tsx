import Box from '@mui/material/Box';
import { useQuery } from '@tanstack/react-query';
import { useMemo, useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import { estimateQueries } from '../features/exposure/api/estimate';
import { SketchForm } from '../features/exposure/components/SketchForm';
import {
  fieldOf,
  readSketch,
  toRequest,
  unknownInAddress,
  writeSketch,
  type SketchErrors,
} from '../features/exposure/sketch';
import { ApiError } from '../lib/api';
import { offeredModes } from '../lib/offeredModes';
import { facilityQueries } from '../lib/queries/facilities';
import { useKeptInAddress } from '../lib/useKeptInAddress';
import { CalculatorFrame } from '../ui/calculator/CalculatorFrame';
import { IncompleteNote } from '../ui/calculator/IncompleteNote';
import { EmptyState } from '../ui/EmptyState';
import { EstimateView } from '../ui/estimate/EstimateView';
import { Note } from '../ui/Note';
import { Loaded } from '../ui/PageStates';
import { Panel } from '../ui/Panel';

export function Component() {
  const [address] = useSearchParams();
  const [typed, setTyped] = useState(() => readSketch(address));
  const [unknown] = useState(() => unknownInAddress(address));
  const telescopes = useQuery(facilityQueries.telescopes());
  const modes = useMemo(() => offeredModes(telescopes.data?.rows ?? []), [telescopes.data]);
  // Without a choice a mode stands that suits the source the page opens with, so that it answers at once.
  const first = modes.find((one) => one.mode.configuration.bandId === 'J') ?? modes[0];
  const mode = modes.some((one) => one.mode.modeId === typed.mode) ? typed.mode : (first?.mode.modeId ?? '');
  const isUnknownMode = typed.mode !== '' && modes.length > 0 && mode !== typed.mode;
  const sketch = useMemo(() => ({ ...typed, mode }), [typed, mode]);
  const settled = useKeptInAddress(sketch, writeSketch, 400);
  const { request, errors } = useMemo(() => toRequest(settled), [settled]);

  const estimate = useQuery({ ...estimateQueries.one(request), enabled: request !== undefined && modes.length > 0 });
  const serverErrors: SketchErrors = {};
  if (request && estimate.error instanceof ApiError) {
    for (const { path, message } of estimate.error.fieldErrors) {
      const field = fieldOf(path, settled);
      if (field) serverErrors[field] ??= message;
    }
  }
  const shownErrors = { ...serverErrors, ...errors };

  return (
    <CalculatorFrame title="Exposure sketchpad">
      <Loaded query={telescopes} what="The instruments">
        {(list) => (
          <Box
            sx={{
              display: 'grid',
              gap: 3,
              gridTemplateColumns: { xs: 'minmax(0, 1fr)', md: 'minmax(0, 5fr) minmax(0, 8fr)' },
              alignItems: 'start',
            }}
          >
            <Panel>
              {unknown.length > 0 && (
                <Box sx={{ mb: 2 }}>
                  <Note tone="warning">
                    This link is of another version: {unknown.join(', ')} in it could not be read and stand as usual.
                  </Note>
                </Box>
              )}
              {isUnknownMode && (
                <Box sx={{ mb: 2 }}>
                  <Note tone="warning">
                    The mode in this link is not offered any more; another one stands in its place.
                  </Note>
                </Box>
              )}
              <SketchForm
                sketch={sketch}
                errors={shownErrors}
                telescopes={list.rows}
                onChange={(change) => setTyped((old) => ({ ...old, ...change }))}
              />
            </Panel>
            {modes.length === 0 ? (
              <Panel>
                <EmptyState title="No instrument is offered">The staff have not put any mode in force yet.</EmptyState>
              </Panel>
            ) : (
              <Box sx={{ minWidth: 0 }}>
                {Object.keys(errors).length > 0 && (
                  <Box sx={{ mb: 2 }}>
                    <IncompleteNote hasAnswer={estimate.data !== undefined} />
                  </Box>
                )}
                {(request !== undefined || estimate.data) && (
                  <Loaded query={estimate} what="The estimate">
                    {(data) => <EstimateView estimate={data} />}
                  </Loaded>
                )}
              </Box>
            )}
          </Box>
        )}
      </Loaded>
    </CalculatorFrame>
  );
}
