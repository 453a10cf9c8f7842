import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Dialog from '@mui/material/Dialog';
import DialogActions from '@mui/material/DialogActions';
import DialogContent from '@mui/material/DialogContent';
import DialogTitle from '@mui/material/DialogTitle';
import { useId, type ReactNode } from 'react';
import { ComparisonTable } from './ComparisonTable';

export interface ChangedMeanwhileDialogProps {
  open: boolean;
  /** Of what: "GN-z11". */
  what: string;
  /** Each thing on which both versions differ. */
  rows: readonly { label: string; mine: ReactNode; theirs: ReactNode }[];
  /** A remark under the table. */
  note?: ReactNode;
  pending?: boolean;
  onMine: () => void;
  onTheirs: () => void;
  /** Decides later: what was typed stays. */
  onLater: () => void;
}

/** Two people changed one thing: both values side by side, and which is to stand. */
export function ChangedMeanwhileDialog({
  open,
  what,
  rows,
  note,
  pending = false,
  onMine,
  onTheirs,
  onLater,
}: ChangedMeanwhileDialogProps) {
  const id = useId();
  return (
    <Dialog open={open} onClose={onLater} aria-labelledby={id} maxWidth="sm" fullWidth>
      <DialogTitle id={id}>{what} was changed by another person meanwhile</DialogTitle>
      <DialogContent>
        <ComparisonTable
          heads={['Mine, typed now', 'Theirs, stored']}
          rows={rows.map(({ label, mine, theirs }) => ({ label, values: [mine, theirs] }))}
        />
        {note && <Box sx={{ mt: 1.5, fontSize: '0.875rem', color: 'text.secondary' }}>{note}</Box>}
      </DialogContent>
      <DialogActions sx={{ px: 3, pb: 2, flexWrap: 'wrap', gap: 1 }}>
        <Button variant="text" onClick={onLater} disabled={pending} autoFocus>
          Decide later
        </Button>
        <Button onClick={onTheirs} disabled={pending}>
          Take theirs
        </Button>
        <Button variant="contained" onClick={onMine} loading={pending}>
          Store mine
        </Button>
      </DialogActions>
    </Dialog>
  );
}
