import type { LightReading } from '@faintward/contracts/light-report';
import Box from '@mui/material/Box';
import InputAdornment from '@mui/material/InputAdornment';
import TextField from '@mui/material/TextField';
import { useEffect, useRef, useState } from 'react';
import { ApiError } from '../../lib/api';
import { parseNumber } from '../form/parseNumber';
import { problemMessage } from '../ProblemDisplay';
import type { DraftProps } from './DraftFields';
import { numberText, quantityFields, type LightDraft, type LightField } from './lightDraft';
import { readLight } from './lightQueries';

export interface ReadingProps {
  /** A text was sent to be read: ends when its outcome is in the draft or shown. It does not fail. */
  onReading?: ((reading: Promise<void>) => void) | undefined;
}

type Kind = keyof typeof quantityFields;

const labels: Record<Kind, string> = {
  none: 'How bright, with its unit',
  apparentMagnitude: 'Magnitude',
  absoluteMagnitude: 'Absolute magnitude',
  lineFlux: 'Line flux',
  lineLuminosity: 'Line luminosity',
  starFormationRate: 'Star-formation rate',
};
const units: Record<Kind, string> = {
  none: '',
  apparentMagnitude: 'mag',
  absoluteMagnitude: 'mag',
  lineFlux: 'erg/s/cm²',
  lineLuminosity: 'erg/s',
  starFormationRate: 'M☉/yr',
};

/** What became of a text that was sent to be read. It belongs to that text in that field only. */
interface Outcome {
  state: 'reading' | 'read' | 'refused' | 'failed';
  field: LightField;
  /** What stands in the field while this holds. */
  text: string;
  words: string;
}

/**
 * The one quantity that says how bright a source is. A bare number is in the field's own unit; a text with a unit is read
 * by the server when the field is left or Enter pressed, and the kind follows. What cannot be read stays as it was typed.
 */
export function QuantityField({
  draft,
  errors,
  disabled = false,
  showLacking = false,
  onChange,
  onReading,
}: DraftProps<LightDraft> & ReadingProps) {
  const kind = draft.light === 'typical' ? 'none' : draft.light;
  const name = quantityFields[kind];
  const text = draft[name];
  const [outcome, setOutcome] = useState<Outcome>();
  const [wasLeft, setWasLeft] = useState(false);
  const request = useRef<AbortController>(undefined);
  const before = useRef(text);
  useEffect(() => () => request.current?.abort(), [name]);

  const isBare = text.trim() === '' || (kind !== 'none' && typeof parseNumber(text) === 'number');
  const current = outcome?.field === name && outcome.text === text ? outcome : undefined;

  const read = () => {
    if (isBare || disabled || current?.state === 'reading' || current?.state === 'refused') return;
    const reading = send();
    onReading?.(reading);
  };
  const send = async () => {
    request.current?.abort();
    const controller = new AbortController();
    request.current = controller;
    setOutcome({ state: 'reading', field: name, text, words: 'Reading…' });
    try {
      const reading = await readLight(
        { text, bandId: draft.band, system: kind === 'absoluteMagnitude' ? draft.absoluteSystem : draft.system },
        controller.signal,
      );
      if (controller.signal.aborted) return;
      const { change, field, value } = takeUp(reading, name, before.current);
      setOutcome({ state: 'read', field, text: value, words: `“${text.trim()}” read as ${reading.meaning}` });
      onChange(change);
    } catch (error) {
      if (controller.signal.aborted) return;
      const own = error instanceof ApiError ? error.fieldErrors.map((fault) => fault.message).join(' ') : '';
      setOutcome(
        own
          ? { state: 'refused', field: name, text, words: own }
          : {
              state: 'failed',
              field: name,
              text,
              words: `Not read: ${problemMessage(error)} Press Enter to try again.`,
            },
      );
    }
  };

  const isRefused = current?.state === 'refused' || current?.state === 'failed';
  const words = current?.words ?? errors[name];
  const isWrong = isRefused || (errors[name] !== undefined && !current && (wasLeft || showLacking));
  const unit = kind === 'apparentMagnitude' && draft.extent === 'uniform' ? 'mag/″²' : units[kind];
  return (
    <TextField
      label={labels[kind]}
      value={text}
      disabled={disabled}
      placeholder={kind === 'none' ? '22.5 mag, 12 uJy, 2e-17 erg/s/cm^2, 8 Msun/yr' : ''}
      onFocus={() => {
        before.current = text;
        setWasLeft(false);
      }}
      onChange={(event) => {
        request.current?.abort();
        onChange({ [name]: event.target.value });
      }}
      onBlur={() => {
        setWasLeft(true);
        read();
      }}
      onKeyDown={(event) => {
        if (event.key !== 'Enter' || isBare) return;
        event.preventDefault();
        read();
      }}
      error={isWrong}
      helperText={
        <Box component="span" role="status">
          {words ?? (kind === 'none' ? 'The unit says what it is.' : 'or any other unit, written behind the number')}
        </Box>
      }
      sx={{ gridColumn: '1 / -1' }}
      slotProps={{
        htmlInput: { autoComplete: 'off', spellCheck: false },
        input:
          unit && isBare
            ? {
                endAdornment: <InputAdornment position="end">{unit}</InputAdornment>,
              }
            : {},
        inputLabel: { shrink: true },
      }}
    />
  );
}

/** A reading as a change of the draft. The field it was typed into gets back the number that stood there. */
function takeUp(reading: LightReading, typedInto: LightField, before: string) {
  const field = quantityFields[reading.kind];
  const value = numberText(Number(reading.value.toPrecision(8)));
  const isNumber = typeof parseNumber(before) === 'number' && typedInto !== 'typed';
  const change: Partial<LightDraft> = {
    [typedInto]: isNumber ? before : '',
    light: reading.kind,
    [field]: value,
    ...(reading.system && reading.kind === 'apparentMagnitude' ? { system: reading.system } : {}),
    ...(reading.system && reading.kind === 'absoluteMagnitude' ? { absoluteSystem: reading.system } : {}),
  };
  return { change, field, value };
}
