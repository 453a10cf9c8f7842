import Button from '@mui/material/Button';
import Snackbar from '@mui/material/Snackbar';
import { createContext, useCallback, useContext, useMemo, useState, type ReactNode } from 'react';

interface NoticeMessage {
  text: string;
  actionLabel?: string;
  onAction?: () => void;
}
type Announce = (notice: string | NoticeMessage) => void;

const NoticesContext = createContext<Announce>(() => {
  throw new Error('useNotices needs NoticesProvider above it');
});

/** Short confirmations at the foot of the page, one after another; read out by screen readers. Not for errors. */
export function NoticesProvider({ children }: { children: ReactNode }) {
  const [queue, setQueue] = useState<readonly (NoticeMessage & { key: number })[]>([]);
  const [open, setOpen] = useState(true);
  const announce = useCallback<Announce>((notice) => {
    const message = typeof notice === 'string' ? { text: notice } : notice;
    setQueue((old) => [...old, { ...message, key: (old.at(-1)?.key ?? 0) + 1 }]);
  }, []);
  const value = useMemo(() => announce, [announce]);
  const current = queue[0];
  return (
    <NoticesContext value={value}>
      {children}
      <Snackbar
        key={current?.key}
        open={open && current !== undefined}
        autoHideDuration={6000}
        onClose={(_event, reason) => {
          if (reason !== 'clickaway') setOpen(false);
        }}
        slotProps={{
          transition: {
            onExited: () => {
              setQueue((old) => old.slice(1));
              setOpen(true);
            },
          },
        }}
        message={current?.text}
        action={
          current?.onAction && (
            <Button
              size="small"
              sx={{ color: 'inherit', borderColor: 'currentColor' }}
              onClick={() => {
                current.onAction?.();
                setOpen(false);
              }}
            >
              {current.actionLabel}
            </Button>
          )
        }
      />
    </NoticesContext>
  );
}

/** `const announce = useNotices(); announce('Saved.')` */
export function useNotices(): Announce {
  return useContext(NoticesContext);
}
