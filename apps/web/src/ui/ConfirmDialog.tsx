import Button from '@mui/material/Button';
import Dialog from '@mui/material/Dialog';
import DialogActions from '@mui/material/DialogActions';
import DialogContent from '@mui/material/DialogContent';
import DialogTitle from '@mui/material/DialogTitle';
import { useId, type ReactNode } from 'react';
import { ProblemDisplay } from './ProblemDisplay';

export interface ConfirmDialogProps {
  open: boolean;
  title: string;
  children: ReactNode;
  /** The verb, as on the button that opened it: "Withdraw the proposal". */
  confirmLabel: string;
  cancelLabel?: string;
  destructive?: boolean;
  pending?: boolean;
  error?: unknown;
  onConfirm: () => void;
  onCancel: () => void;
}

/** Asks before something that cannot simply be undone. The safe answer has the focus. */
export function ConfirmDialog({
  open,
  title,
  children,
  confirmLabel,
  cancelLabel = 'Cancel',
  destructive = false,
  pending = false,
  error,
  onConfirm,
  onCancel,
}: ConfirmDialogProps) {
  const id = useId();
  return (
    <Dialog open={open} onClose={() => !pending && onCancel()} aria-labelledby={id} maxWidth="sm" fullWidth>
      <DialogTitle id={id}>{title}</DialogTitle>
      <DialogContent>
        {children}
        {Boolean(error) && <ProblemDisplay error={error} />}
      </DialogContent>
      <DialogActions sx={{ px: 3, pb: 2 }}>
        <Button onClick={onCancel} disabled={pending} autoFocus>
          {cancelLabel}
        </Button>
        <Button variant="contained" color={destructive ? 'error' : 'primary'} loading={pending} onClick={onConfirm}>
          {confirmLabel}
        </Button>
      </DialogActions>
    </Dialog>
  );
}
