import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import LinearProgress from '@mui/material/LinearProgress';
import Skeleton from '@mui/material/Skeleton';
import Typography from '@mui/material/Typography';
import type { ReactNode } from 'react';
import { Link as RouterLink } from 'react-router-dom';
import { ApiError } from '../lib/api';
import { EmptyState } from './EmptyState';
import { Note } from './Note';
import { PageFrame } from './PageFrame';
import { ProblemDisplay } from './ProblemDisplay';

export interface QueryState<Data> {
  data: Data | undefined;
  error: unknown;
  isFetching: boolean;
  refetch: () => unknown;
}

export interface LoadedProps<Data> {
  query: QueryState<Data>;
  /** "The instruments", for "The instruments could not be loaded". */
  what: string;
  /** Drawn while there is nothing yet; should have the size of the result. */
  skeleton?: ReactNode;
  children: (data: Data) => ReactNode;
}

/** The states of one query around its view: pending, failed, not found, old data that could not be renewed, renewing, ready. */
export function Loaded<Data>({ query, what, skeleton, children }: LoadedProps<Data>) {
  const retry = () => void query.refetch();
  if (query.data === undefined) {
    if (!query.error) return <Box aria-busy="true">{skeleton ?? <SkeletonBlock label={`${what}: loading`} />}</Box>;
    if (isMissing(query.error)) return <NothingHere />;
    return <ProblemDisplay error={query.error} what={`${what} could not be loaded`} onRetry={retry} />;
  }
  return (
    <Box sx={{ position: 'relative' }}>
      {query.isFetching && (
        <LinearProgress aria-label={`${what}: refreshing`} sx={{ position: 'absolute', top: -8, left: 0, right: 0 }} />
      )}
      {Boolean(query.error) && (
        <Box sx={{ mb: 1.5 }}>
          <Note
            tone="warning"
            live
            action={
              <Button size="small" onClick={retry}>
                Retry
              </Button>
            }
          >
            {what} could not be refreshed: what is shown may be out of date.
          </Note>
        </Box>
      )}
      {children(query.data)}
    </Box>
  );
}

/** What one may not see answers as if it were absent, so both are one page. */
export function isMissing(error: unknown): boolean {
  return error instanceof ApiError && (error.status === 404 || error.status === 403);
}

export function SkeletonBlock({
  label,
  lines = 6,
  note,
}: {
  label: string;
  lines?: number;
  /** Why it may take seconds. */
  note?: string;
}) {
  return (
    <Box role="status" aria-label={label}>
      {note && <Typography color="textSecondary">{note}</Typography>}
      {Array.from({ length: lines }, (_, index) => (
        <Skeleton
          key={index}
          variant="text"
          height={30}
          width={index === 0 ? '40%' : index % 3 === 2 ? '82%' : '100%'}
        />
      ))}
    </Box>
  );
}

export function NothingHere() {
  return (
    <EmptyState
      title="There is nothing here, or nothing that you may see"
      action={
        <Button component={RouterLink} to="/">
          To the front page
        </Button>
      }
    >
      The address may be mistyped, the thing withdrawn, or meant for other people.
    </EmptyState>
  );
}

export function NotFoundPage() {
  return (
    <PageFrame title="Not found" width="reading">
      <NothingHere />
    </PageFrame>
  );
}
