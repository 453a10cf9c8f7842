import type { ProposalChangePage } from '@faintward/contracts/proposals';
import Box from '@mui/material/Box';
import Link from '@mui/material/Link';
import { Link as RouterLink } from 'react-router-dom';
import type { z } from 'zod';
import { paths } from '../../../app/paths';
import { counted } from '../../../lib/format';
import { ChangeList } from './ChangeList';

/** The last changes of one thing, and the way to the history of the whole proposal. */
export function LastChanges({ proposalId, list }: { proposalId: string; list: z.output<typeof ProposalChangePage> }) {
  const olderCount = list.rowCount - list.rows.length;
  return (
    <>
      <ChangeList entries={list.rows} withSubject={false} />
      <Box
        sx={{
          borderTop: list.rows.length > 0 ? 1 : 0,
          borderColor: 'divider',
          px: { xs: 2, md: 2.5 },
          pt: list.rows.length > 0 ? 1.25 : 0,
          pb: list.rows.length > 0 ? 1.25 : 2,
          fontSize: '0.875rem',
          color: 'text.secondary',
        }}
      >
        {list.rows.length === 0 &&
          'No entry of its own yet: what many targets have in common, such as an import, is one entry of the proposal. '}
        {olderCount > 0 && `${counted(olderCount, 'older change')} of it not shown. `}
        <Link component={RouterLink} to={paths.proposalSection.to(proposalId, 'history')} underline="always">
          The whole history of the proposal
        </Link>
      </Box>
    </>
  );
}
