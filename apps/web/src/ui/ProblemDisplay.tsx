import Button from '@mui/material/Button';
import Typography from '@mui/material/Typography';
import { ApiError } from '../lib/api';
import { Note } from './Note';

/** What went wrong, in words for the person. Faults of this page itself say so; their details are for the console. */
export function problemMessage(error: unknown): string {
  if (error instanceof ApiError) {
    if (error.code === 'rate-limited' && error.retryAfterSeconds) {
      return `${error.message} Try again in ${Math.ceil(error.retryAfterSeconds)} s.`;
    }
    return error.message;
  }
  return 'This page met a fault of its own. Reloading it may help.';
}

export interface ProblemDisplayProps {
  error: unknown;
  /** What could not be done, as the start of a sentence: "The targets could not be loaded". */
  what?: string;
  onRetry?: () => void;
  /** Field errors are listed unless a form shows them under its fields. */
  hideFieldErrors?: boolean;
}

/** A problem (RFC 9457) as a notice: what failed, which fields, a way to try again, the reference for the staff. */
export function ProblemDisplay({ error, what, onRetry, hideFieldErrors = false }: ProblemDisplayProps) {
  const problem = error instanceof ApiError ? error : undefined;
  const fieldErrors = hideFieldErrors ? [] : (problem?.fieldErrors ?? []);
  return (
    <Note
      tone="error"
      live
      action={
        onRetry && (
          <Button size="small" onClick={onRetry}>
            Retry
          </Button>
        )
      }
    >
      {what ? `${what}. ` : ''}
      {problemMessage(error)}
      {fieldErrors.length > 0 && (
        <ul style={{ margin: '4px 0 0', paddingInlineStart: 20 }}>
          {fieldErrors.map((fieldError) => (
            <li key={`${fieldError.path} ${fieldError.message}`}>
              {fieldError.path ? <code>{fieldError.path}</code> : null} {fieldError.message}
            </li>
          ))}
        </ul>
      )}
      {problem?.errorId && (
        <Typography variant="body2" color="textSecondary" component="div">
          Reference for the staff: <code>{problem.errorId}</code>
        </Typography>
      )}
    </Note>
  );
}
