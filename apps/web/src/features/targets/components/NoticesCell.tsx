import type { Notice } from '@faintward/contracts/common';
import ButtonBase from '@mui/material/ButtonBase';
import Popover from '@mui/material/Popover';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { useId, useState } from 'react';
import { Note } from '../../../ui/Note';
import { bySeverity } from '../../../lib/bySeverity';
import { shortNotice } from '../cells';

const tones = { error: 'error.main', warning: 'warning.main', note: 'text.secondary' } as const;

/** The most severe notice in a few words; all of them, in whole sentences, when it is opened. */
export function NoticesCell({
  name,
  notices,
  tabIndex,
}: {
  name: string;
  notices: readonly Notice[];
  tabIndex: 0 | -1;
}) {
  const [anchor, setAnchor] = useState<HTMLElement | null>(null);
  const id = useId();
  const sorted = bySeverity(notices);
  const [first] = sorted;
  if (!first) return null;
  return (
    <>
      <ButtonBase
        tabIndex={tabIndex}
        aria-haspopup="dialog"
        aria-expanded={anchor !== null}
        onClick={(event) => setAnchor(event.currentTarget)}
        sx={{
          font: 'inherit',
          color: tones[first.severity],
          display: 'block',
          maxWidth: '100%',
          overflow: 'hidden',
          textOverflow: 'ellipsis',
          whiteSpace: 'nowrap',
        }}
      >
        <span aria-hidden="true">{first.severity === 'note' ? '· ' : '▲ '}</span>
        {shortNotice(first)}
        {sorted.length > 1 && ` +${sorted.length - 1}`}
      </ButtonBase>
      <Popover
        open={anchor !== null}
        anchorEl={anchor}
        onClose={() => setAnchor(null)}
        anchorOrigin={{ vertical: 'bottom', horizontal: 'left' }}
        slotProps={{ paper: { role: 'dialog', 'aria-labelledby': id, sx: { maxWidth: 460, p: 2 } } }}
      >
        <Typography variant="h3" component="h2" id={id} tabIndex={-1} sx={{ mb: 1 }}>
          {name}
        </Typography>
        <Stack sx={{ gap: 1 }}>
          {sorted.map((notice) => (
            <Note key={`${notice.code} ${notice.message}`} tone={notice.severity}>
              {notice.message}
            </Note>
          ))}
        </Stack>
      </Popover>
    </>
  );
}
