import { CaseSection } from '@faintward/contracts/proposals';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import TextField from '@mui/material/TextField';
import Typography from '@mui/material/Typography';
import { useId, useRef, useState } from 'react';
import { ApiError } from '../../../lib/api';
import { formatNumber } from '../../../lib/format';
import { Note } from '../../../ui/Note';
import { Panel } from '../../../ui/Panel';
import { LeaveGuard } from '../../../ui/form/LeaveGuard';
import { SaveStatus } from '../../../ui/form/SaveStatus';
import { useAutosave } from '../../../ui/form/useAutosave';
import { useSaveCaseSection } from '../api/proposals';

/** Words as the limit counts them: runs of anything but white space. */
const countWords = (text: string) => text.match(/\S+/g)?.length ?? 0;

/** One section of the case, saved while it is typed. A colleague's newer text is shown beside one's own, never over it. */
export function CaseSectionEditor({
  proposalId,
  section,
  canEdit,
}: {
  proposalId: string;
  section: CaseSection;
  canEdit: boolean;
}) {
  const save = useSaveCaseSection(proposalId);
  const [text, setText] = useState(section.body);
  const [theirs, setTheirs] = useState<CaseSection>();
  const version = useRef(section.version);
  const id = useId();
  const autosave = useAutosave<string>({
    save: async (body) => {
      try {
        const saved = await save.mutateAsync({ sectionId: section.sectionId, version: version.current, body });
        version.current = saved.version;
        setTheirs(undefined);
      } catch (error) {
        const current =
          error instanceof ApiError && error.code === 'stale-version'
            ? CaseSection.safeParse(error.current)
            : undefined;
        if (current?.success) setTheirs(current.data);
        throw error;
      }
    },
  });
  const words = countWords(text);
  const isOver = words > section.wordLimit;

  if (!canEdit) {
    return (
      <Panel title={section.title}>
        {section.body ? (
          <Typography variant="reading" component="div" sx={{ whiteSpace: 'pre-wrap' }}>
            {section.body}
          </Typography>
        ) : (
          <Typography color="textSecondary">Nothing has been written here.</Typography>
        )}
      </Panel>
    );
  }
  return (
    <Panel
      title={section.isRequired ? section.title : `${section.title} (if wanted)`}
      note={<span id={`${id}-guidance`}>{section.guidance}</span>}
      actions={
        <Typography variant="body2" color="textSecondary" component="div" aria-live="polite">
          <SaveStatus state={autosave.state} onRetry={autosave.retry} />
        </Typography>
      }
    >
      <LeaveGuard when={autosave.hasUnsaved} what={`The text of "${section.title}"`} />
      {theirs && (
        <Box sx={{ mb: 1.5 }}>
          <Note
            tone="warning"
            live
            action={
              <Stack direction="row" sx={{ gap: 1 }}>
                <Button
                  size="small"
                  onClick={() => {
                    version.current = theirs.version;
                    autosave.change(text);
                    void autosave.flush();
                  }}
                >
                  Keep mine
                </Button>
                <Button
                  size="small"
                  onClick={() => {
                    version.current = theirs.version;
                    setText(theirs.body);
                    autosave.change(theirs.body);
                    void autosave.flush();
                  }}
                >
                  Take theirs
                </Button>
              </Stack>
            }
          >
            {theirs.updatedByName ?? 'Somebody'} saved another text meanwhile. Yours is still here and has not been
            saved.
            <Typography
              variant="reading"
              component="div"
              sx={{ mt: 1, maxHeight: 220, overflow: 'auto', whiteSpace: 'pre-wrap' }}
              tabIndex={0}
            >
              {theirs.body || '(empty)'}
            </Typography>
          </Note>
        </Box>
      )}
      <TextField
        value={text}
        onChange={(event) => {
          setText(event.target.value);
          autosave.change(event.target.value);
        }}
        multiline
        minRows={6}
        maxRows={28}
        fullWidth
        error={isOver}
        helperText={`${formatNumber(words, { decimals: 0 })} of ${formatNumber(section.wordLimit, { decimals: 0 })} words${isOver ? ': too long to submit' : ''}`}
        slotProps={{
          htmlInput: { 'aria-label': section.title, 'aria-describedby': `${id}-guidance`, style: { lineHeight: 1.55 } },
        }}
      />
    </Panel>
  );
}
