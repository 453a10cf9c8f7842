import Box from '@mui/material/Box';
import ButtonBase from '@mui/material/ButtonBase';
import Popover from '@mui/material/Popover';
import Typography from '@mui/material/Typography';
import { useId, useState, type ReactNode } from 'react';
import { formatNumber, type NumberFormat } from '../lib/format';

/** Where a number comes from. Comes with the number, from the server or from a feature's list of definitions. */
export interface Explanation {
  title: string;
  /** What it is, in a sentence. */
  meaning?: ReactNode;
  formula?: ReactNode;
  inputs?: readonly { label: string; value: ReactNode }[];
  /** Paper, table and equation, or the version of the configuration. */
  source?: ReactNode;
}

export interface QuantityProps extends NumberFormat {
  value: number | null | undefined;
  unit?: string;
  /** With it the number is a button that opens its explanation. */
  explanation?: Explanation;
  /** Why it is not known, read out in place of the dash. */
  unknownReason?: string;
  strong?: boolean;
}

/** A number with its unit, which can say where it comes from. */
export function Quantity({ value, unit, explanation, unknownReason, strong, ...format }: QuantityProps) {
  const known = value != null && Number.isFinite(value);
  const text = formatNumber(value, format);
  const content = (
    <Box component="span" sx={{ whiteSpace: 'nowrap', fontWeight: strong ? 600 : undefined }}>
      {known ? text : <span title={unknownReason}>{text}</span>}
      {known && unit && (
        <Box component="span" sx={{ color: 'text.secondary', fontWeight: 400 }}>
          {'\u202f'}
          {unit}
        </Box>
      )}
    </Box>
  );
  return explanation ? <Explained explanation={explanation}>{content}</Explained> : content;
}

/** Anything that opens an explanation on click, Enter or Space. */
export function Explained({ explanation, children }: { explanation: Explanation; children: ReactNode }) {
  const [anchor, setAnchor] = useState<HTMLElement | null>(null);
  const id = useId();
  return (
    <>
      <ButtonBase
        onClick={(event) => setAnchor(event.currentTarget)}
        aria-haspopup="dialog"
        aria-expanded={anchor !== null}
        sx={{
          font: 'inherit',
          color: 'inherit',
          borderRadius: '3px',
          verticalAlign: 'baseline',
          textAlign: 'inherit',
          textDecoration: 'underline dotted',
          textDecorationColor: 'var(--fw-palette-faintward-edge)',
          textUnderlineOffset: '3px',
        }}
      >
        {children}
      </ButtonBase>
      <Popover
        open={anchor !== null}
        anchorEl={anchor}
        onClose={() => setAnchor(null)}
        anchorOrigin={{ vertical: 'bottom', horizontal: 'left' }}
        slotProps={{ paper: { role: 'dialog', 'aria-labelledby': id, sx: { maxWidth: 420, p: 2 } } }}
      >
        <Typography variant="h3" component="h2" id={id} tabIndex={-1}>
          {explanation.title}
        </Typography>
        {explanation.meaning && <Typography sx={{ mt: 0.75 }}>{explanation.meaning}</Typography>}
        {explanation.formula && (
          <Typography variant="figure" component="p" sx={{ mt: 1, p: 1, bgcolor: 'faintward.raised' }}>
            {explanation.formula}
          </Typography>
        )}
        {explanation.inputs && explanation.inputs.length > 0 && (
          <Box
            component="dl"
            sx={{ display: 'grid', gridTemplateColumns: 'auto 1fr', columnGap: 2, mt: 1, fontSize: '0.875rem' }}
          >
            {explanation.inputs.map((input) => (
              <Box key={input.label} sx={{ display: 'contents' }}>
                <Box component="dt" sx={{ color: 'text.secondary' }}>
                  {input.label}
                </Box>
                <Box component="dd" sx={{ m: 0, textAlign: 'right' }}>
                  {input.value}
                </Box>
              </Box>
            ))}
          </Box>
        )}
        {explanation.source && (
          <Typography variant="body2" color="textSecondary" sx={{ mt: 1 }}>
            Source: {explanation.source}
          </Typography>
        )}
      </Popover>
    </>
  );
}
