import Button from '@mui/material/Button';
import Box from '@mui/material/Box';
import { ApiError } from '../../lib/api';
import { problemMessage } from '../ProblemDisplay';
import { Ago } from '../TimeDisplay';
import type { SaveState } from './useAutosave';

/** "saved 12 s ago", "saving", "not saved: …". Failures are announced, the rest is not: it would chatter. */
export function SaveStatus({ state, onRetry }: { state: SaveState; onRetry?: () => void }) {
  switch (state.kind) {
    case 'idle':
      return null;
    case 'waiting':
      return <span>not saved yet</span>;
    case 'saving':
      return <span>saving…</span>;
    case 'saved':
      return (
        <span>
          saved <Ago since={state.at} />
        </span>
      );
    case 'failed': {
      const offline = state.error instanceof ApiError && state.error.code === 'unreachable';
      return (
        <Box component="span" role="alert" sx={{ color: 'error.main' }}>
          not saved: {offline ? 'offline. It will be saved when the connection returns.' : problemMessage(state.error)}{' '}
          {onRetry && (
            <Button size="small" variant="text" onClick={onRetry} sx={{ py: 0 }}>
              Try again
            </Button>
          )}
        </Box>
      );
    }
  }
}
