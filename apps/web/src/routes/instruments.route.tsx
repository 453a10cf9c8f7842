import type { Mode } from '@faintward/contracts/facilities';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link as RouterLink } from 'react-router-dom';
import { paths } from '../app/paths';
import { ModeHistory } from '../features/facilities/components/ModeHistory';
import { ModeSheet } from '../features/facilities/components/ModeSheet';
import { formatNumber } from '../lib/format';
import { facilityQueries } from '../lib/queries/facilities';
import { sessionQueries } from '../lib/queries/session';
import { EmptyState } from '../ui/EmptyState';
import { Loaded } from '../ui/PageStates';
import { PageFrame } from '../ui/PageFrame';
import { Panel } from '../ui/Panel';

/** Telescopes, their instruments and modes, with the configuration that every estimate uses. */
export function Component() {
  const query = useQuery(facilityQueries.telescopes());
  return (
    <PageFrame title="Instruments" eyebrow={query.data?.observatoryName}>
      <Loaded query={query} what="The instruments">
        {(list) =>
          list.rows.length === 0 ? (
            <Panel>
              <EmptyState title="No telescope has been set up yet" />
            </Panel>
          ) : (
            <Stack sx={{ gap: 5 }}>
              {list.rows.map((telescope) => (
                <Box component="section" key={telescope.telescopeId} aria-label={telescope.name}>
                  <Typography variant="h2">{telescope.name}</Typography>
                  <Typography color="textSecondary" sx={{ mb: 2 }}>
                    {formatNumber(telescope.diameterM, { decimals: 1 })} m, obstruction{' '}
                    {formatNumber(telescope.obstructionDiameterM, { decimals: 1 })} m · {telescope.site.name},{' '}
                    {formatNumber(telescope.site.elevationM, { decimals: 0 })} m · seeing, median{' '}
                    {formatNumber(telescope.site.zenithSeeingArcsec, { decimals: 2 })} ″ · points from{' '}
                    {formatNumber(telescope.altitudeLowDeg, { decimals: 0 })}° to{' '}
                    {formatNumber(telescope.altitudeHighDeg, { decimals: 1 })}° altitude
                  </Typography>
                  <Stack sx={{ gap: 2 }}>
                    {telescope.instruments.map((instrument) => (
                      <Panel
                        key={instrument.instrumentId}
                        title={instrument.isOffered ? instrument.name : `${instrument.name} (not offered)`}
                        note={instrument.description}
                      >
                        {instrument.modes.map((mode) => (
                          <ModeEntry key={mode.modeId} mode={mode} />
                        ))}
                      </Panel>
                    ))}
                  </Stack>
                </Box>
              ))}
            </Stack>
          )
        }
      </Loaded>
    </PageFrame>
  );
}

function ModeEntry({ mode }: { mode: Mode }) {
  const [open, setOpen] = useState(false);
  const me = useQuery(sessionQueries.me()).data;
  return (
    <Box
      component="details"
      open={open}
      onToggle={(event) => setOpen(event.currentTarget.open)}
      sx={{ borderTop: 1, borderColor: 'divider' }}
    >
      <Box component="summary" sx={{ py: 1, cursor: 'pointer' }}>
        <strong>{mode.name}</strong>{' '}
        <Box component="span" sx={{ color: 'text.secondary' }}>
          {formatNumber(mode.configuration.wavelengthLowNm, { decimals: 0 })} to{' '}
          {formatNumber(mode.configuration.wavelengthHighNm, { decimals: 0 })} nm
          {mode.configuration.kind === 'slitSpectroscopy'
            ? `, R ${formatNumber(mode.configuration.resolvingPower, { decimals: 0 })}`
            : ''}{' '}
          · configuration {mode.configurationVersion}
          {mode.isOffered ? '' : ' · not offered'}
        </Box>
      </Box>
      {open && (
        <Box sx={{ pb: 2, pl: 2 }}>
          <ModeSheet configuration={mode.configuration} />
          {me?.isStaff && (
            <Button
              size="small"
              component={RouterLink}
              to={paths.newConfiguration.to(mode.modeId)}
              aria-label={`New configuration of ${mode.name}`}
              sx={{ mt: 2, mr: 1 }}
            >
              New configuration
            </Button>
          )}
          {me && <HistoryOf modeId={mode.modeId} />}
        </Box>
      )}
    </Box>
  );
}

function HistoryOf({ modeId }: { modeId: string }) {
  const [shown, setShown] = useState(false);
  return (
    <>
      <Button size="small" variant="text" sx={{ mt: 2 }} onClick={() => setShown(!shown)} aria-expanded={shown}>
        {shown ? 'Hide the versions' : 'Versions'}
      </Button>
      {shown && <LoadedHistory modeId={modeId} />}
    </>
  );
}

function LoadedHistory({ modeId }: { modeId: string }) {
  const query = useQuery(facilityQueries.configurations(modeId));
  return (
    <Box sx={{ mt: 1 }}>
      <Loaded query={query} what="The versions">
        {(history) => <ModeHistory versions={history.rows} />}
      </Loaded>
    </Box>
  );
}
