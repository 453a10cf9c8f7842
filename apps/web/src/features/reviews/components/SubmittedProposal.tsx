import type { Review } from '@faintward/contracts/reviews';
import type { Observation } from '@faintward/contracts/observations';
import type { Target } from '@faintward/contracts/targets';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import Table from '@mui/material/Table';
import TableBody from '@mui/material/TableBody';
import TableCell from '@mui/material/TableCell';
import TableContainer from '@mui/material/TableContainer';
import TableHead from '@mui/material/TableHead';
import TableRow from '@mui/material/TableRow';
import Typography from '@mui/material/Typography';
import { useState } from 'react';
import { counted, formatNumber } from '../../../lib/format';
import { groupBy } from '../../../lib/groupBy';
import { Panel } from '../../../ui/Panel';
import { Quantity } from '../../../ui/Quantity';
import { RedshiftWithUncertainty } from '../../../ui/light/RedshiftWithUncertainty';

/** What was submitted, for reading: text first, then numbers. Team only where the semester shows it. */
export function SubmittedProposal({ content }: { content: Review['content'] }) {
  const { timeRequest } = content;
  return (
    <Stack sx={{ gap: 2.25, minWidth: 0 }}>
      <Panel title="Summary" note={content.keywords.join(', ')}>
        <Typography variant="reading" component="div" sx={{ whiteSpace: 'pre-wrap' }}>
          {content.abstract || 'No summary was given.'}
        </Typography>
        {content.team && (
          <Typography variant="body2" color="textSecondary" sx={{ mt: 1.5 }}>
            {content.team
              .map((member) => `${member.name}${member.institutionName ? ` (${member.institutionName})` : ''}`)
              .join(', ')}
          </Typography>
        )}
      </Panel>
      <Panel title="Hours asked for">
        <Typography>
          <Quantity value={timeRequest.totalHours} decimals={1} unit="h" strong /> in all:{' '}
          {timeRequest.rows
            .map((row) => `${row.instrumentName} ${formatNumber(row.totalHours, { decimals: 1 })} h ${row.moonClass}`)
            .join(' · ')}
        </Typography>
        {timeRequest.infeasibleCount > 0 && (
          <Typography color="warning.main" sx={{ mt: 0.5 }}>
            {counted(timeRequest.infeasibleCount, 'observation')} cannot reach the goal.
          </Typography>
        )}
      </Panel>
      {content.case
        .filter((section) => section.body.trim() !== '')
        .map((section) => (
          <Panel key={section.sectionId} title={section.title}>
            <Typography variant="reading" component="div" sx={{ whiteSpace: 'pre-wrap' }}>
              {section.body}
            </Typography>
          </Panel>
        ))}
      <TargetsTable targets={content.targets} observations={content.observations} />
    </Stack>
  );
}

const firstRows = 20;

function TargetsTable({ targets, observations }: { targets: readonly Target[]; observations: readonly Observation[] }) {
  const [showsAll, setShowsAll] = useState(false);
  const byTarget = groupBy(observations, (observation) => observation.targetId);
  const shown = showsAll ? targets : targets.slice(0, firstRows);
  return (
    <Panel
      title={counted(targets.length, 'target')}
      note="Magnitudes, sizes and times as they were computed at submission."
      flush
    >
      <TableContainer tabIndex={0} role="region" aria-label="Targets and exposures">
        <Table size="small">
          <TableHead>
            <TableRow>
              <TableCell>Target</TableCell>
              <TableCell>Redshift</TableCell>
              <TableCell align="right">
                m
                <Box component="small" sx={{ display: 'block', fontWeight: 400 }}>
                  AB
                </Box>
              </TableCell>
              <TableCell align="right">
                D<sub>L</sub>
                <Box component="small" sx={{ display: 'block', fontWeight: 400 }}>
                  Mpc
                </Box>
              </TableCell>
              <TableCell>Setup</TableCell>
              <TableCell align="right">S/N</TableCell>
              <TableCell align="right">
                Time
                <Box component="small" sx={{ display: 'block', fontWeight: 400 }}>
                  h
                </Box>
              </TableCell>
            </TableRow>
          </TableHead>
          <TableBody>
            {shown.flatMap((target) => {
              const own = byTarget.get(target.targetId) ?? [undefined];
              return own.map((observation, index) => (
                <TableRow key={`${target.targetId} ${observation?.observationId ?? 'none'}`}>
                  <TableCell sx={{ whiteSpace: 'nowrap' }}>{index === 0 ? target.name : ''}</TableCell>
                  <TableCell>{index === 0 && <RedshiftWithUncertainty target={target} />}</TableCell>
                  <TableCell align="right">
                    {index === 0 && formatNumber(target.computed.apparentMagnitudeAb, { decimals: 2 })}
                  </TableCell>
                  <TableCell align="right">
                    {index === 0 && formatNumber(target.computed.luminosityDistanceMpc, { decimals: 0 })}
                  </TableCell>
                  <TableCell sx={{ whiteSpace: 'nowrap' }}>
                    {observation ? `${observation.instrumentName}, ${observation.modeName}` : '—'}
                  </TableCell>
                  <TableCell align="right">
                    {observation?.estimate?.outcome === 'feasible'
                      ? formatNumber(observation.estimate.signalToNoise, { decimals: 1 })
                      : '—'}
                  </TableCell>
                  <TableCell align="right">
                    {observation?.estimate?.outcome === 'infeasible' ? (
                      <span title={observation.estimate.reason.message}>infeasible</span>
                    ) : (
                      formatNumber(observation?.totalSeconds == null ? null : observation.totalSeconds / 3600, {
                        decimals: 2,
                      })
                    )}
                  </TableCell>
                </TableRow>
              ));
            })}
          </TableBody>
        </Table>
      </TableContainer>
      {targets.length > firstRows && (
        <Box sx={{ p: 1.5 }}>
          <Button size="small" onClick={() => setShowsAll(!showsAll)}>
            {showsAll ? 'Show fewer' : `Show all ${counted(targets.length, 'target')}`}
          </Button>
        </Box>
      )}
    </Panel>
  );
}
