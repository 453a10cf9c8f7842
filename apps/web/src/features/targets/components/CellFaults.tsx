import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Typography from '@mui/material/Typography';
import { counted } from '../../../lib/format';
import { cellWords } from '../cells';
import type { CellDraft, CellEdits } from '../hooks/useCellEdits';

/** Every cell that holds something not stored: which row and column, why, and what can be done. Announced when it grows. */
export function CellFaults({
  edits,
  onGoTo,
  onCompare,
}: {
  edits: CellEdits;
  /** Undefined for a row that is not on this page. */
  onGoTo: (draft: CellDraft) => (() => void) | undefined;
  onCompare: (key: string) => void;
}) {
  const faults = [...edits.drafts].filter(([, draft]) => draft.state !== 'saving');
  const unsentCount = faults.filter(([, draft]) => draft.state === 'unsent').length;
  return (
    <Box role="status" aria-label="Cells that are not stored" sx={{ mt: faults.length > 0 ? 1.5 : 0 }}>
      {faults.length > 0 && (
        <Box sx={{ borderLeft: 3, borderColor: 'error.main', bgcolor: 'faintward.raised', px: 1.75, py: 1 }}>
          <Box sx={{ display: 'flex', gap: 2, alignItems: 'center', flexWrap: 'wrap' }}>
            <Typography variant="body2" sx={{ fontWeight: 600, flex: 1 }}>
              {counted(faults.length, 'cell is', 'cells are')} not stored; what was typed stays in the table
            </Typography>
            {unsentCount > 1 && (
              <Button size="small" onClick={edits.retryUnsent}>
                Send all again
              </Button>
            )}
          </Box>
          <Box component="ul" sx={{ listStyle: 'none', m: 0, p: 0, fontSize: '0.875rem' }}>
            {faults.map(([key, draft]) => {
              const goTo = onGoTo(draft);
              return (
                <Box
                  component="li"
                  key={key}
                  sx={{ display: 'flex', gap: 1, alignItems: 'center', flexWrap: 'wrap', py: 0.25 }}
                >
                  <Box sx={{ flex: '1 1 320px', minWidth: 0, overflowWrap: 'anywhere' }}>
                    <strong>{draft.targetName}</strong>, {cellWords[draft.cell]} “{draft.text}”: {draft.message}
                  </Box>
                  {goTo && (
                    <Button size="small" variant="text" onClick={goTo}>
                      Go to the cell
                    </Button>
                  )}
                  {draft.state === 'unsent' && (
                    <Button size="small" variant="text" onClick={() => edits.retry(key)}>
                      Send again
                    </Button>
                  )}
                  {draft.state === 'stale' && (
                    <Button size="small" variant="text" onClick={() => onCompare(key)}>
                      Compare
                    </Button>
                  )}
                  <Button size="small" variant="text" onClick={() => edits.discard(key)}>
                    Put back {draft.before === '' ? 'the empty cell' : `“${shorten(draft.before)}”`}
                  </Button>
                </Box>
              );
            })}
          </Box>
        </Box>
      )}
    </Box>
  );
}

function shorten(text: string): string {
  return text.length > 32 ? `${text.slice(0, 31)}…` : text;
}
