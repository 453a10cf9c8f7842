import Box from '@mui/material/Box';
import ButtonBase from '@mui/material/ButtonBase';
import ClickAwayListener from '@mui/material/ClickAwayListener';
import Paper from '@mui/material/Paper';
import Popper from '@mui/material/Popper';
import Typography from '@mui/material/Typography';
import { useId, useRef, useState, type KeyboardEvent } from 'react';
import { formatNumber } from '../../lib/format';
import { colour } from '../../theme/theme';
import { visuallyHidden } from '../visuallyHidden';
import { inputWords, stageWords, type LedgerLayout, type LedgerRow } from './ledger';

/**
 * The rows of a ledger as a list of buttons over its drawing. A step shows its formula, inputs and source when the keyboard
 * reaches it, and on click; the arrow keys go from step to step, Escape closes.
 */
export function LedgerSteps({ layout, width, what }: { layout: LedgerLayout; width: number; what: string }) {
  const [open, setOpen] = useState<{ id: string; anchor: HTMLElement } | null>(null);
  const list = useRef<HTMLOListElement>(null);
  const byPointer = useRef(false);
  const cardId = useId();
  const opened = open && layout.rows.find(({ row }) => row.id === open.id)?.row;

  function onKeyDown(event: KeyboardEvent) {
    if (event.key === 'Escape' && open) {
      event.stopPropagation();
      setOpen(null);
      return;
    }
    const move = { ArrowDown: 1, ArrowUp: -1, ArrowRight: 1, ArrowLeft: -1 }[event.key];
    if (!move) return;
    const buttons = [...(list.current?.querySelectorAll('button') ?? [])];
    const index = buttons.findIndex((button) => button === document.activeElement);
    const next = buttons[index + move];
    if (index === -1 || !next) return;
    event.preventDefault();
    next.focus();
  }

  return (
    <ClickAwayListener onClickAway={() => setOpen(null)}>
      <Box
        component="ol"
        ref={list}
        aria-label={`${what}, step by step`}
        onKeyDown={onKeyDown}
        sx={{ listStyle: 'none', m: 0, p: 0, position: 'absolute', inset: 0 }}
      >
        {layout.stages.map((stage) => (
          <Box
            key={stage.stage}
            component="li"
            aria-hidden="true"
            sx={{
              position: 'absolute',
              left: 0,
              top: stage.labelTop + (layout.isNarrow ? 4 : 8),
              width: layout.isNarrow ? width : layout.titleLeft - 12,
              fontSize: '0.75rem',
              lineHeight: 1.2,
              color: 'text.secondary',
              fontWeight: layout.isNarrow ? 600 : 400,
            }}
          >
            <span style={{ background: colour.surface }}>{stageWords[stage.stage]}</span>
          </Box>
        ))}
        {layout.rows.map(({ row, top, height }) => (
          <Box key={row.id} component="li" sx={{ position: 'absolute', left: layout.titleLeft, right: 0, top, height }}>
            <ButtonBase
              aria-expanded={open?.id === row.id}
              aria-describedby={open?.id === row.id ? cardId : undefined}
              onPointerDown={() => (byPointer.current = true)}
              onFocus={(event) => {
                if (!byPointer.current) setOpen({ id: row.id, anchor: event.currentTarget });
              }}
              onBlur={() => {
                byPointer.current = false;
                setOpen(null);
              }}
              onClick={(event) => {
                byPointer.current = false;
                const anchor = event.currentTarget;
                setOpen((old) => (old?.id === row.id ? null : { id: row.id, anchor }));
              }}
              sx={rowButton}
            >
              <RowText row={row} isNarrow={layout.isNarrow} titleWidth={layout.titleWidth} />
            </ButtonBase>
          </Box>
        ))}
        {open && opened && (
          <Popper id={cardId} open anchorEl={open.anchor} placement="bottom-start" sx={{ zIndex: 'tooltip' }}>
            <StepCard row={opened} />
          </Popper>
        )}
      </Box>
    </ClickAwayListener>
  );
}

const rowButton = {
  position: 'absolute',
  inset: 0,
  font: 'inherit',
  fontSize: '0.8125rem',
  lineHeight: 1.15,
  color: 'text.primary',
  textAlign: 'left',
  alignItems: 'stretch',
  justifyContent: 'flex-start',
  borderRadius: '3px',
  '&:hover .name, &[aria-expanded="true"] .name': { textDecorationColor: 'var(--fw-palette-text-primary)' },
} as const;

function RowText({ row, isNarrow, titleWidth }: { row: LedgerRow; isNarrow: boolean; titleWidth: number }) {
  const change = formatNumber(row.deltaMag, { decimals: 2, signed: true });
  // On a phone links and grid lines run through the text: it hides them behind it.
  const ground = isNarrow ? { background: colour.surface, paddingRight: 3 } : undefined;
  return (
    <Box
      component="span"
      sx={{
        display: 'flex',
        width: '100%',
        gap: 1,
        alignItems: isNarrow ? 'flex-start' : 'center',
        pt: isNarrow ? 0.75 : 0,
      }}
    >
      <Box
        component="span"
        className="name"
        sx={{
          width: isNarrow ? 'auto' : titleWidth,
          flex: isNarrow ? 1 : 'none',
          minWidth: 0,
          overflow: 'hidden',
          display: '-webkit-box',
          WebkitBoxOrient: 'vertical',
          WebkitLineClamp: '2',
          textDecoration: 'underline dotted',
          textDecorationColor: 'var(--fw-palette-faintward-edge)',
          textUnderlineOffset: '3px',
        }}
      >
        <span style={ground}>{row.title}</span>
      </Box>
      {isNarrow ? (
        <Box component="span" sx={{ flex: 'none', width: 52, textAlign: 'right' }}>
          <span style={ground}>{row.kind === 'start' ? '' : change}</span>
        </Box>
      ) : (
        <span style={{ flex: 1 }}>
          <span style={visuallyHidden}>{row.kind === 'start' ? '' : `, ${change} mag`}</span>
        </span>
      )}
      <Box component="span" sx={{ flex: 'none', width: 50, textAlign: 'right', fontWeight: 600 }}>
        <span style={visuallyHidden}>, total </span>
        <span style={ground}>{formatNumber(row.totalMag, { decimals: 2 })}</span>
      </Box>
    </Box>
  );
}

function StepCard({ row }: { row: LedgerRow }) {
  return (
    <Paper
      sx={{ border: '1px solid var(--fw-palette-faintward-edge)', p: 1.75, mt: 0.5, maxWidth: 400, width: '92vw' }}
    >
      <Typography variant="h3" component="p">
        {row.title}
      </Typography>
      {row.formula && (
        <Typography variant="figure" component="p" sx={{ mt: 1, p: 1, bgcolor: 'faintward.raised' }}>
          {row.formula}
        </Typography>
      )}
      <Box
        component="dl"
        sx={{ display: 'grid', gridTemplateColumns: 'auto 1fr', columnGap: 2, my: 1, fontSize: '0.875rem' }}
      >
        {(row.inputs ?? []).map((input) => (
          <Line
            key={input.name}
            label={inputWords(input.name, input.unit)}
            value={`${formatNumber(input.value)} ${input.unit}`}
          />
        ))}
        {row.kind !== 'start' && (
          <Line label="change" value={`${formatNumber(row.deltaMag, { decimals: 4, signed: true })} mag`} />
        )}
        <Line label="running total" value={`${formatNumber(row.totalMag, { decimals: 4 })} mag`} />
      </Box>
      {row.source && (
        <Typography variant="body2" color="textSecondary">
          Source: {row.source}
        </Typography>
      )}
    </Paper>
  );
}

function Line({ label, value }: { label: string; value: string }) {
  return (
    <>
      <Box component="dt" sx={{ color: 'text.secondary' }}>
        {label}
      </Box>
      <Box component="dd" sx={{ m: 0, textAlign: 'right' }}>
        {value}
      </Box>
    </>
  );
}
