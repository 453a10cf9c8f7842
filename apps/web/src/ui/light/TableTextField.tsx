import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import TextField from '@mui/material/TextField';
import { useRef, useState } from 'react';
import { fonts } from '../../theme/tokens';
import type { DraftProps } from './DraftFields';

/** Longer texts are kept but not put into the field: the browser would choke on them. */
const longestShown = 100_000;

/** Columns of numbers, pasted or from a file. */
export function TableTextField({
  label,
  value,
  error,
  disabled = false,
  placeholder,
  onChange,
}: {
  label: string;
  value: string;
  error: string | undefined;
  disabled?: boolean;
  placeholder: string;
  onChange: (text: string, fileName?: string) => void;
}) {
  const input = useRef<HTMLInputElement>(null);
  const [fileName, setFileName] = useState<string>();
  const [fileProblem, setFileProblem] = useState<string>();
  const isLong = value.length > longestShown;
  const [isReading, setIsReading] = useState(false);
  const choose = async (file: File) => {
    setIsReading(true);
    try {
      onChange(await file.text(), file.name);
      setFileName(file.name);
      setFileProblem(undefined);
    } catch (problem) {
      setFileProblem(`${file.name} could not be read${problem instanceof Error ? `: ${problem.message}` : '.'}`);
    } finally {
      setIsReading(false);
    }
  };
  return (
    <Box sx={{ display: 'flex', gap: 1.5, alignItems: 'flex-start', flexDirection: { xs: 'column', sm: 'row' } }}>
      <TextField
        label={label}
        value={isLong ? '' : value}
        placeholder={isLong ? `${value.length} characters${fileName ? ` from ${fileName}` : ''}` : placeholder}
        disabled={disabled || isLong}
        onChange={(event) => {
          setFileName(undefined);
          onChange(event.target.value);
        }}
        multiline
        minRows={4}
        maxRows={4}
        error={error !== undefined || fileProblem !== undefined}
        helperText={fileProblem ?? error ?? (fileName && value !== '' ? `From ${fileName}.` : undefined)}
        slotProps={{
          htmlInput: { spellCheck: false, style: { fontFamily: fonts.mono, whiteSpace: 'pre', overflowX: 'auto' } },
          inputLabel: { shrink: true },
        }}
      />
      <Button disabled={disabled} loading={isReading} onClick={() => input.current?.click()}>
        Choose a file
      </Button>
      {isLong && (
        <Button variant="text" disabled={disabled} onClick={() => onChange('')}>
          Use another
        </Button>
      )}
      <input
        ref={input}
        type="file"
        hidden
        aria-label={`File for: ${label}`}
        accept=".csv,.tsv,.txt,.dat,.ecsv,.tab,text/*"
        onChange={(event) => {
          const [file] = event.target.files ?? [];
          // So that the same file can be chosen again after it was mended.
          event.target.value = '';
          if (file) void choose(file);
        }}
      />
    </Box>
  );
}

/** A line of text in a form over a draft. */
export function DraftText<Draft>({
  draft,
  errors,
  disabled = false,
  onChange,
  name,
  label,
  hint,
}: DraftProps<Draft> & { name: keyof Draft & string; label: string; hint?: string }) {
  return (
    <TextField
      label={label}
      value={String(draft[name])}
      disabled={disabled}
      onChange={(event) => onChange({ [name]: event.target.value } as Partial<Draft>)}
      error={errors[name] !== undefined}
      helperText={errors[name] ?? hint}
    />
  );
}
