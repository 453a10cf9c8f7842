import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Dialog from '@mui/material/Dialog';
import DialogActions from '@mui/material/DialogActions';
import DialogContent from '@mui/material/DialogContent';
import DialogTitle from '@mui/material/DialogTitle';
import { useId, type ReactNode } from 'react';

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
        <Box
          component="table"
          sx={{
            width: '100%',
            borderCollapse: 'collapse',
            fontSize: '0.875rem',
            '& th, & td': { textAlign: 'left', verticalAlign: 'top', py: 0.75, pr: 2, overflowWrap: 'anywhere' },
            '& thead th': { color: 'text.secondary', fontSize: '0.8125rem', borderBottom: 1, borderColor: 'divider' },
            '& tbody th': { fontWeight: 400, color: 'text.secondary' },
          }}
        >
          <thead>
            <tr>
              <td />
              <th scope="col">Mine, typed now</th>
              <th scope="col">Theirs, stored</th>
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => (
              <tr key={row.label}>
                <th scope="row">{row.label}</th>
                <td>{row.mine}</td>
                <td>{row.theirs}</td>
              </tr>
            ))}
          </tbody>
        </Box>
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
