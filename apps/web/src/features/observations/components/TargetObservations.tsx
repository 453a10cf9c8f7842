import type { Observation } from '@faintward/contracts/observations';
import Box from '@mui/material/Box';
import Link from '@mui/material/Link';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { Link as RouterLink } from 'react-router-dom';
import { paths } from '../../../app/paths';
import { describeConditions, describeGoal } from '../plan';
import { EstimateSummary } from './EstimateSummary';

/** The observations of one target, on its sheet: each with its answer and its light budget. */
export function TargetObservations({
  proposalId,
  observations,
}: {
  proposalId: string;
  observations: readonly Observation[];
}) {
  const exposures = paths.proposalSection.to(proposalId, 'exposures');
  if (observations.length === 0) {
    return (
      <Typography color="textSecondary">
        None yet.{' '}
        <Link component={RouterLink} to={exposures} underline="always">
          Apply a setup
        </Link>{' '}
        to see what it takes, and its light budget.
      </Typography>
    );
  }
  return (
    <Stack sx={{ gap: 2 }}>
      {observations.map((observation) => (
        <Box key={observation.observationId} sx={{ borderTop: 1, borderColor: 'divider', pt: 1.25 }}>
          <Link
            component={RouterLink}
            to={`${exposures}?search=${encodeURIComponent(observation.targetName)}&observation=${observation.observationId}`}
            sx={{ fontWeight: 600 }}
          >
            {observation.instrumentName} · {observation.modeName}
          </Link>
          <Typography variant="body2" color="textSecondary" sx={{ mb: 1 }}>
            {describeGoal(observation.goal)} · {describeConditions(observation.conditions)}
            {observation.repeatCount > 1 && ` · ${observation.repeatCount} times`}
          </Typography>
          {observation.estimate ? (
            <EstimateSummary estimate={observation.estimate} />
          ) : (
            <Typography>{observation.lacking}</Typography>
          )}
        </Box>
      ))}
    </Stack>
  );
}
