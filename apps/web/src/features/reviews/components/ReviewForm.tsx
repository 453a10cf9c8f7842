import { Review, type ReviewInput } from '@faintward/contracts/reviews';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import TextField from '@mui/material/TextField';
import Typography from '@mui/material/Typography';
import { useRef, useState } from 'react';
import { ApiError } from '../../../lib/api';
import { formatNumber } from '../../../lib/format';
import { Note } from '../../../ui/Note';
import { Panel } from '../../../ui/Panel';
import { Quantity } from '../../../ui/Quantity';
import { LeaveGuard } from '../../../ui/form/LeaveGuard';
import { SaveStatus } from '../../../ui/form/SaveStatus';
import { useAutosave } from '../../../ui/form/useAutosave';
import { useSaveReview } from '../api/reviews';
import { ScoreInput } from './ScoreInput';

interface Typed {
  answers: Review['answers'];
  commentToPrincipal: string;
  confidentialComment: string;
}

/** The scoring form: saved while it is typed. */
export function ReviewForm({ review }: { review: Review }) {
  const save = useSaveReview(review.proposalId);
  const version = useRef(review.version);
  const [typed, setTyped] = useState<Typed>({
    answers: review.answers,
    commentToPrincipal: review.commentToPrincipal,
    confidentialComment: review.confidentialComment,
  });
  const autosave = useAutosave<ReviewInput>({
    delayMs: 700,
    save: async (input) => {
      try {
        const saved = await save.mutateAsync({ version: version.current, input });
        version.current = saved.version;
      } catch (error) {
        // Another window of the same reviewer saved meanwhile: what is typed here last is what counts.
        const current =
          error instanceof ApiError && error.code === 'stale-version' ? Review.safeParse(error.current) : undefined;
        if (!current?.success) throw error;
        version.current = current.data.version;
        const saved = await save.mutateAsync({ version: version.current, input });
        version.current = saved.version;
      }
    },
  });
  const change = (next: Typed, cleared?: string) => {
    setTyped(next);
    // An answer taken back is sent as null: a criterion that is only left out would keep its old score.
    autosave.change({ ...next, answers: { ...next.answers, ...(cleared ? { [cleared]: null } : {}) } });
  };
  const missing = review.criteria.filter((criterion) => !typed.answers[criterion.criterionId]);
  return (
    <Panel
      title="Your review"
      actions={
        <Typography variant="body2" color="textSecondary" component="div" aria-live="polite">
          <SaveStatus state={autosave.state} onRetry={autosave.retry} />
        </Typography>
      }
    >
      <LeaveGuard when={autosave.hasUnsaved} what="Your scores" />
      {!review.canEdit && (
        <Box sx={{ mb: 2 }}>
          <Note>This review is closed and can no longer be changed.</Note>
        </Box>
      )}
      <Stack sx={{ gap: 2.75 }}>
        {review.criteria.map((criterion) => (
          <ScoreInput
            key={criterion.criterionId}
            criterion={criterion}
            answer={typed.answers[criterion.criterionId]}
            disabled={!review.canEdit}
            onChange={(answer) => {
              const answers = { ...typed.answers };
              if (answer) answers[criterion.criterionId] = answer;
              else delete answers[criterion.criterionId];
              change({ ...typed, answers }, answer ? undefined : criterion.criterionId);
            }}
          />
        ))}
        <Box
          sx={{
            display: 'flex',
            justifyContent: 'space-between',
            borderTop: 1,
            borderColor: 'divider',
            pt: 1.5,
            gap: 2,
          }}
        >
          <span>
            Overall{' '}
            <Quantity
              value={review.overallScore}
              decimals={2}
              strong
              unknownReason="no criterion is scored yet"
              explanation={{
                title: 'Overall score',
                meaning:
                  'The mean of your scores, weighted as the semester defines. "Cannot judge" and open criteria do not count.',
                formula: 'Σ wᵢ sᵢ / Σ wᵢ over the scored criteria',
                inputs: review.criteria.map((criterion) => ({
                  label: criterion.title,
                  value: `weight ${formatNumber(criterion.weight)}`,
                })),
                source: 'criteria of the semester',
              }}
            />
          </span>
          <Typography color={missing.length === 0 ? 'success.main' : 'text.secondary'} component="span">
            {missing.length === 0 ? 'complete' : `open: ${missing.map((criterion) => criterion.title).join(', ')}`}
          </Typography>
        </Box>
        <TextField
          label="To the principal investigator"
          helperText="Sent with the decision, without your name."
          value={typed.commentToPrincipal}
          onChange={(event) => change({ ...typed, commentToPrincipal: event.target.value })}
          multiline
          minRows={3}
          maxRows={14}
          disabled={!review.canEdit}
        />
        <TextField
          label="For the panel only"
          helperText="Never shown to the team."
          value={typed.confidentialComment}
          onChange={(event) => change({ ...typed, confidentialComment: event.target.value })}
          multiline
          minRows={2}
          maxRows={14}
          disabled={!review.canEdit}
        />
        {review.canEdit && autosave.state.kind === 'failed' && (
          <Button onClick={autosave.retry} variant="contained">
            Save again
          </Button>
        )}
      </Stack>
    </Panel>
  );
}
