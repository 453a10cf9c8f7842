import { BandId, MagnitudeSystem } from '@faintward/contracts/light';
import {
  MAX_IMPORT_CHARACTERS,
  type ImportPreview,
  type ImportResult,
  type ImportRole,
} from '@faintward/contracts/targets';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Checkbox from '@mui/material/Checkbox';
import Dialog from '@mui/material/Dialog';
import DialogActions from '@mui/material/DialogActions';
import DialogContent from '@mui/material/DialogContent';
import DialogTitle from '@mui/material/DialogTitle';
import FormControlLabel from '@mui/material/FormControlLabel';
import LinearProgress from '@mui/material/LinearProgress';
import MenuItem from '@mui/material/MenuItem';
import Stack from '@mui/material/Stack';
import TextField from '@mui/material/TextField';
import Typography from '@mui/material/Typography';
import useMediaQuery from '@mui/material/useMediaQuery';
import { useQuery } from '@tanstack/react-query';
import { useId, useMemo, useRef, useState } from 'react';
import { newIdempotencyKey } from '../../../lib/api';
import { downloadText, toCsv } from '../../../lib/csv';
import { counted, formatNumber } from '../../../lib/format';
import { useDebounced } from '../../../lib/useDebounced';
import { Note } from '../../../ui/Note';
import { ProblemDisplay } from '../../../ui/ProblemDisplay';
import { fonts } from '../../../theme/tokens';
import { targetQueries, useImportTargets, type ImportInput } from '../api/targets';
import { readTableFile } from '../readTableFile';
import { ImportTable } from './ImportTable';

export interface ImportDialogProps {
  proposalId: string;
  open: boolean;
  /** Pasted into the page before the dialog opened; a new object for each paste. */
  pasted: { text: string } | undefined;
  onClose: () => void;
  onImported: (result: ImportResult) => void;
}

/** Text longer than this is not put into the text field: the browser would choke on it. It is kept all the same. */
const longestShownText = 200_000;

interface Source {
  text: string;
  /** Changes with the text, for the query's key. */
  revision: string;
  fileName: string | undefined;
}
const nothing: Source = { text: '', revision: 'none', fileName: undefined };
const firstOptions: ImportInput['options'] = { skipDuplicates: true };

/** A table, pasted or from a file: which column is what, what is wrong in which cell, and then into the list. */
export function ImportDialog({ proposalId, open, pasted, onClose, onImported }: ImportDialogProps) {
  const id = useId();
  const isSmall = useMediaQuery('(max-width: 899.95px)');
  const fileInput = useRef<HTMLInputElement>(null);
  const [source, setSource] = useState<Source>(nothing);
  const [options, setOptions] = useState(firstOptions);
  const [fileProblem, setFileProblem] = useState<string>();
  const [onlyFaulty, setOnlyFaulty] = useState(false);
  // One key for one intention: the same table under the same choices, however often its answer is lost.
  const [key, setKey] = useState(newIdempotencyKey);
  const importTargets = useImportTargets(proposalId);

  const change = (next: { source?: Source; options?: ImportInput['options'] }) => {
    importTargets.reset();
    setKey(newIdempotencyKey());
    if (next.source) {
      setSource(next.source);
      setFileProblem(undefined);
      // Roles belong to columns, and these may be other ones now.
      setOptions(({ roles: _roles, hasHeader: _hasHeader, ...rest }) => rest);
    }
    if (next.options) setOptions(next.options);
  };
  const setText = (text: string, fileName?: string) =>
    change({ source: { text, revision: newIdempotencyKey(), fileName } });

  const [seenPaste, setSeenPaste] = useState<ImportDialogProps['pasted']>();
  if (pasted !== seenPaste) {
    setSeenPaste(pasted);
    if (pasted) setText(pasted.text);
  }

  const request = useMemo(() => ({ source, options }), [source, options]);
  const settled = useDebounced(request, 300);
  const isEmpty = source.text.trim() === '';
  const isTooLong = source.text.length > MAX_IMPORT_CHARACTERS;
  const settledIsEmpty = settled.source.text.trim() === '';
  const preview = useQuery({
    ...targetQueries.importPreview(proposalId, settled.source.revision, {
      text: settled.source.text,
      options: settled.options,
    }),
    enabled: open && !settledIsEmpty && settled.source.text.length <= MAX_IMPORT_CHARACTERS,
  });
  const shown = isEmpty || settledIsEmpty ? undefined : preview.data;
  const isSettled = settled === request && !preview.isPlaceholderData && !preview.isFetching && !preview.error;
  // Duplicates are skipped only when asked for.
  const importCount = shown ? shown.readyCount - (options.skipDuplicates ? shown.duplicateCount : 0) : 0;

  const chooseFile = async (file: File) => {
    const read = await readTableFile(file);
    if (read.ok) setText(read.text, file.name);
    else setFileProblem(read.message);
  };
  const submit = () =>
    importTargets.mutate(
      { request: { text: source.text, options }, idempotencyKey: key },
      {
        onSuccess: (result) => {
          setSource(nothing);
          setOptions(firstOptions);
          setKey(newIdempotencyKey());
          onImported(result);
        },
      },
    );

  return (
    <Dialog
      open={open}
      onClose={() => !importTargets.isPending && onClose()}
      aria-labelledby={id}
      maxWidth="xl"
      fullWidth
      fullScreen={isSmall}
    >
      <DialogTitle id={id}>Import targets</DialogTitle>
      <DialogContent
        onDragOver={(event) => event.preventDefault()}
        onDrop={(event) => {
          event.preventDefault();
          const [file] = event.dataTransfer.files;
          if (file) void chooseFile(file);
        }}
      >
        <Stack sx={{ gap: 2, pt: 1 }}>
          <SourceField
            source={source}
            disabled={importTargets.isPending}
            rows={shown ? 3 : 8}
            onText={setText}
            onChooseFile={() => fileInput.current?.click()}
          />
          <input
            ref={fileInput}
            type="file"
            hidden
            aria-label="Table file"
            accept=".csv,.tsv,.txt,.dat,.ecsv,.tab,text/*"
            onChange={(event) => {
              const [file] = event.target.files ?? [];
              // So that the same file can be chosen again after it was mended.
              event.target.value = '';
              if (file) void chooseFile(file);
            }}
          />
          {fileProblem && (
            <Note tone="error" live>
              {fileProblem}
            </Note>
          )}
          {isTooLong && (
            <Note tone="error" live>
              This text has {formatNumber(source.text.length, { decimals: 0 })} characters; at most{' '}
              {formatNumber(MAX_IMPORT_CHARACTERS, { decimals: 0 })} can be imported at once.
            </Note>
          )}
          <Box aria-live="polite" sx={{ height: 4 }}>
            {!isEmpty && !isTooLong && (preview.isFetching || settled !== request) && (
              <LinearProgress aria-label="Reading the table" />
            )}
          </Box>
          {!isEmpty && preview.error && (
            <ProblemDisplay
              error={preview.error}
              what="The table could not be read"
              onRetry={() => void preview.refetch()}
            />
          )}
          {shown && (
            <>
              <Choices options={options} preview={shown} onChange={(next) => change({ options: next })} />
              <Counts
                preview={shown}
                onlyFaulty={onlyFaulty}
                onOnlyFaulty={setOnlyFaulty}
                onDownload={() => downloadText('faulty-rows.csv', faultyRowsCsv(shown))}
              />
              {shown.tableErrors.map((message) => (
                <Note key={message} tone="error" live>
                  {message}
                </Note>
              ))}
              <ImportTable
                preview={shown}
                onlyFaulty={onlyFaulty}
                disabled={importTargets.isPending}
                onRole={(index, role) =>
                  change({
                    options: {
                      ...options,
                      hasHeader: shown.hasHeader,
                      roles: shown.columns.map((column, at) => (at === index ? role : freed(column.role, role))),
                    },
                  })
                }
              />
              <FaultList preview={shown} />
            </>
          )}
          {importTargets.error && (
            <ProblemDisplay
              error={importTargets.error}
              what="Nothing was imported; the table is still here"
              onRetry={submit}
            />
          )}
        </Stack>
      </DialogContent>
      <DialogActions sx={{ px: 3, pb: 2, flexWrap: 'wrap', gap: 1 }}>
        {shown && shown.faultyCount > 0 && importCount > 0 && (
          <Typography variant="body2" color="textSecondary" sx={{ flex: 1, minWidth: 200 }}>
            {counted(shown.faultyCount, 'faulty row is', 'faulty rows are')} left out.
          </Typography>
        )}
        <Button variant="text" onClick={onClose} disabled={importTargets.isPending}>
          Close
        </Button>
        <Button
          variant="contained"
          loading={importTargets.isPending}
          disabled={!shown || !isSettled || importCount === 0 || shown.tableErrors.length > 0}
          onClick={submit}
        >
          {shown ? `Import ${counted(importCount, 'target')}` : 'Import'}
        </Button>
      </DialogActions>
    </Dialog>
  );
}

/** A role that another column just took is free again. */
function freed(role: ImportRole, taken: ImportRole): ImportRole {
  return role === taken && taken !== 'ignore' ? 'ignore' : role;
}

function SourceField({
  source,
  disabled,
  rows,
  onText,
  onChooseFile,
}: {
  source: Source;
  disabled: boolean;
  rows: number;
  onText: (text: string) => void;
  onChooseFile: () => void;
}) {
  const isLong = source.text.length > longestShownText;
  return (
    <Box sx={{ display: 'flex', gap: 2, alignItems: 'flex-start', flexDirection: { xs: 'column', sm: 'row' } }}>
      {isLong ? (
        <Box sx={{ flex: 1, bgcolor: 'faintward.raised', p: 1.75, fontSize: '0.875rem', width: '100%' }}>
          {source.fileName ? <strong>{source.fileName}</strong> : 'The pasted table'} has{' '}
          {formatNumber(source.text.length, { decimals: 0 })} characters and is too long to be shown here.{' '}
          <Button size="small" variant="text" onClick={() => onText('')} disabled={disabled}>
            Use another
          </Button>
        </Box>
      ) : (
        <TextField
          label="Table"
          placeholder={'name, ra, dec, z, mag\nField 7 A, 02 15 30.77, -04 09 13.8, 7.12, 26.0 AB (J)'}
          value={source.text}
          disabled={disabled}
          onChange={(event) => onText(event.target.value)}
          multiline
          minRows={rows}
          maxRows={rows}
          fullWidth
          helperText={
            source.fileName
              ? `From ${source.fileName}.`
              : 'Paste cells from a spreadsheet, or comma-, tab- or space-separated text; drop a file here.'
          }
          slotProps={{
            htmlInput: { spellCheck: false, style: { fontFamily: fonts.mono, whiteSpace: 'pre', overflowX: 'auto' } },
            inputLabel: { shrink: true },
          }}
        />
      )}
      <Button onClick={onChooseFile} disabled={disabled} sx={{ whiteSpace: 'nowrap' }}>
        Choose a file
      </Button>
    </Box>
  );
}

function Choices({
  options,
  preview,
  onChange,
}: {
  options: ImportInput['options'];
  preview: ImportPreview;
  onChange: (options: ImportInput['options']) => void;
}) {
  return (
    <Stack direction="row" sx={{ gap: 2, flexWrap: 'wrap', alignItems: 'center' }}>
      <BareBrightness
        label="A bare brightness is in band"
        width={230}
        value={options.brightnessBandId}
        choices={BandId.options}
        usual="V"
        onChange={(value) => {
          const { brightnessBandId: _old, ...rest } = options;
          onChange(value === '' ? rest : { ...rest, brightnessBandId: BandId.parse(value) });
        }}
      />
      <BareBrightness
        label="and in system"
        width={230}
        value={options.brightnessSystem}
        choices={MagnitudeSystem.options}
        usual="AB"
        onChange={(value) => {
          const { brightnessSystem: _old, ...rest } = options;
          onChange(value === '' ? rest : { ...rest, brightnessSystem: MagnitudeSystem.parse(value) });
        }}
      />
      <FormControlLabel
        label="First line names the columns"
        control={
          <Checkbox
            checked={options.hasHeader ?? preview.hasHeader}
            onChange={(_event, hasHeader) => {
              const { roles: _roles, ...rest } = options;
              onChange({ ...rest, hasHeader });
            }}
          />
        }
      />
      <FormControlLabel
        label="Skip what is in the list already"
        control={
          <Checkbox
            checked={options.skipDuplicates}
            onChange={(_event, skipDuplicates) => onChange({ ...options, skipDuplicates })}
          />
        }
      />
    </Stack>
  );
}

/** What a number without a unit means. Left alone, the header of the column decides. */
function BareBrightness({
  label,
  width,
  value,
  choices,
  usual,
  onChange,
}: {
  label: string;
  width: number;
  value: string | undefined;
  choices: readonly string[];
  usual: string;
  onChange: (value: string) => void;
}) {
  return (
    <TextField
      select
      label={label}
      size="small"
      sx={{ width }}
      value={value ?? ''}
      onChange={(event) => onChange(event.target.value)}
      slotProps={{ select: { displayEmpty: true }, inputLabel: { shrink: true } }}
    >
      <MenuItem value="">as the header says, else {usual}</MenuItem>
      {choices.map((choice) => (
        <MenuItem key={choice} value={choice}>
          {choice}
        </MenuItem>
      ))}
    </TextField>
  );
}

function Counts({
  preview,
  onlyFaulty,
  onOnlyFaulty,
  onDownload,
}: {
  preview: ImportPreview;
  onlyFaulty: boolean;
  onOnlyFaulty: (only: boolean) => void;
  onDownload: () => void;
}) {
  return (
    <Stack
      direction="row"
      sx={{ gap: 2.5, flexWrap: 'wrap', alignItems: 'center', fontSize: '0.875rem' }}
      role="status"
    >
      <span>
        <strong>{counted(preview.rowCount, 'row')}</strong>
      </span>
      <Box component="span" sx={{ color: 'success.main' }}>
        ✓ {formatNumber(preview.readyCount, { decimals: 0 })} ready
      </Box>
      <Box component="span" sx={{ color: preview.faultyCount > 0 ? 'error.main' : 'text.secondary' }}>
        ▲ {formatNumber(preview.faultyCount, { decimals: 0 })} faulty
      </Box>
      <span>{formatNumber(preview.duplicateCount, { decimals: 0 })} in the list already, or twice in the table</span>
      {preview.faultyCount > 0 && (
        <>
          <FormControlLabel
            label="Only faulty rows"
            control={
              <Checkbox size="small" checked={onlyFaulty} onChange={(_event, checked) => onOnlyFaulty(checked)} />
            }
          />
          <Button size="small" onClick={onDownload}>
            Faulty rows as CSV
          </Button>
        </>
      )}
    </Stack>
  );
}

const listedFaults = 12;

/** The faults again as sentences, for those who do not look for red cells. */
function FaultList({ preview }: { preview: ImportPreview }) {
  const faults = preview.rows.flatMap((row) => [
    ...row.rowErrors.map((message) => `Line ${row.lineNumber}: ${message}`),
    ...row.cells.flatMap((cell, index) =>
      cell.error
        ? [`Line ${row.lineNumber}, ${preview.columns[index]?.header || `column ${index + 1}`}: ${cell.error}`]
        : [],
    ),
  ]);
  if (faults.length === 0) return null;
  return (
    <Box component="section" aria-label="What is wrong">
      <Typography variant="h4">What is wrong</Typography>
      <Box component="ul" sx={{ pl: 2.25, my: 0.75, fontSize: '0.875rem' }}>
        {faults.slice(0, listedFaults).map((fault) => (
          <li key={fault}>{fault}</li>
        ))}
      </Box>
      {faults.length > listedFaults && (
        <Typography variant="body2" color="textSecondary">
          and {formatNumber(faults.length - listedFaults, { decimals: 0 })} more, in the table above.
        </Typography>
      )}
    </Box>
  );
}

/** The faulty rows that the preview holds, with what is wrong, to be mended in a spreadsheet and imported again. */
function faultyRowsCsv(preview: ImportPreview): string {
  return toCsv(
    [...preview.columns.map((column, index) => column.header || `column ${index + 1}`), 'line', 'what is wrong'],
    preview.rows
      .filter((row) => !row.isReady)
      .map((row) => [
        ...row.cells.map((cell) => cell.text),
        row.lineNumber,
        [...row.rowErrors, ...row.cells.flatMap((cell) => cell.error ?? [])].join(' '),
      ]),
  );
}
