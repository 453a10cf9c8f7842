import ExpandMoreIcon from '@mui/icons-material/ExpandMore';
import Box from '@mui/material/Box';
import ButtonBase from '@mui/material/ButtonBase';
import Collapse from '@mui/material/Collapse';
import { useId, useState, type ReactNode } from 'react';

/** Something that is opened when it is wanted, with what it holds in a few words while it is closed. */
export function Disclosure({
  title,
  summary,
  mustOpen = false,
  onOpen,
  children,
}: {
  title: string;
  summary?: ReactNode;
  /** Something inside needs to be seen, such as a fault. */
  mustOpen?: boolean;
  onOpen?: () => void;
  children: ReactNode;
}) {
  const [wanted, setWanted] = useState(false);
  const id = useId();
  const isOpen = wanted || mustOpen;
  return (
    <Box sx={{ borderTop: 1, borderColor: 'divider' }}>
      <ButtonBase
        aria-expanded={isOpen}
        aria-controls={id}
        onClick={() => {
          setWanted(!isOpen);
          if (!isOpen) onOpen?.();
        }}
        sx={{ display: 'flex', width: '100%', gap: 1, py: 1.1, textAlign: 'left', font: 'inherit' }}
      >
        <Box component="span" sx={{ fontWeight: 600, fontSize: '0.875rem' }}>
          {title}
        </Box>
        <Box
          component="span"
          sx={{ flex: 1, minWidth: 0, color: 'text.secondary', fontSize: '0.8125rem', textAlign: 'right' }}
        >
          {!isOpen && summary}
        </Box>
        <ExpandMoreIcon
          fontSize="small"
          sx={{ color: 'text.secondary', transform: isOpen ? 'rotate(180deg)' : 'none' }}
        />
      </ButtonBase>
      <Collapse in={isOpen} unmountOnExit id={id}>
        <Box sx={{ pt: 1, pb: 2 }}>{children}</Box>
      </Collapse>
    </Box>
  );
}
