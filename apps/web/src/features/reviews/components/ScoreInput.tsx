import type { ScoreAnswer } from '@faintward/contracts/reviews';
import type { Criterion } from '@faintward/contracts/semesters';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Slider from '@mui/material/Slider';
import Stack from '@mui/material/Stack';
import TextField from '@mui/material/TextField';
import Typography from '@mui/material/Typography';
import { useId, useState } from 'react';

const marks = [0, 2, 4, 6, 8, 10].map((value) => ({ value, label: String(value) }));

/** One criterion: a score from 0 to 10 in half steps, or "cannot judge". By slider, by typing, by keyboard. */
export function ScoreInput({
  criterion,
  answer,
  disabled,
  onChange,
}: {
  criterion: Criterion;
  answer: ScoreAnswer | undefined;
  disabled: boolean;
  onChange: (answer: ScoreAnswer | null) => void;
}) {
  const id = useId();
  const score = answer?.kind === 'score' ? answer.score : undefined;
  const [text, setText] = useState(score === undefined ? '' : String(score));
  const [seen, setSeen] = useState(score);
  if (score !== seen) {
    setSeen(score);
    setText(score === undefined ? '' : String(score));
  }
  const [error, setError] = useState<string>();
  const take = (typed: string) => {
    setText(typed);
    if (typed.trim() === '') {
      setError(undefined);
      setSeen(undefined);
      onChange(null);
      return;
    }
    const value = Number(typed.replace(',', '.'));
    if (!Number.isFinite(value) || value < 0 || value > 10 || value * 2 !== Math.round(value * 2)) {
      setError('0 to 10 in half steps, such as 7.5');
      return;
    }
    setError(undefined);
    setSeen(value);
    onChange({ kind: 'score', score: value });
  };
  return (
    <Box component="fieldset" disabled={disabled} sx={{ border: 0, p: 0, m: 0, minWidth: 0 }}>
      <Typography component="legend" sx={{ fontWeight: 600, p: 0 }} id={`${id}-title`}>
        {criterion.title}
      </Typography>
      <Stack direction="row" sx={{ gap: 2, alignItems: 'flex-start', mt: 0.5 }}>
        <TextField
          value={text}
          onChange={(event) => take(event.target.value)}
          error={error !== undefined}
          size="small"
          sx={{ width: 84, flex: 'none' }}
          placeholder="—"
          slotProps={{
            htmlInput: {
              inputMode: 'decimal',
              'aria-label': `${criterion.title}: score`,
              'aria-describedby': `${id}-hint`,
              style: { textAlign: 'right' },
            },
          }}
        />
        <Box sx={{ flex: 1, px: 1, minWidth: 0 }}>
          <Slider
            value={score ?? 0}
            onChange={(_event, value) => take(String(value))}
            min={0}
            max={10}
            step={0.5}
            marks={marks}
            disabled={disabled}
            aria-label={`${criterion.title}: score on the scale`}
            // Without a score the thumb is pale; the scale stays readable.
            sx={{
              py: 1,
              '& .MuiSlider-thumb, & .MuiSlider-track, & .MuiSlider-rail': score === undefined ? { opacity: 0.4 } : {},
              '& .MuiSlider-markLabel': { color: 'text.secondary' },
            }}
          />
        </Box>
      </Stack>
      <Typography
        id={`${id}-hint`}
        variant="body2"
        role={error ? 'alert' : undefined}
        color={error ? 'error.main' : 'text.secondary'}
      >
        {error ?? `0 ${criterion.anchors.low} · 5 ${criterion.anchors.middle} · 10 ${criterion.anchors.high}`}
      </Typography>
      <Button
        size="small"
        variant="text"
        aria-pressed={answer?.kind === 'cannotJudge'}
        onClick={() => {
          setError(undefined);
          onChange(answer?.kind === 'cannotJudge' ? null : { kind: 'cannotJudge' });
        }}
        sx={{ px: 0, fontWeight: answer?.kind === 'cannotJudge' ? 700 : 400 }}
      >
        {answer?.kind === 'cannotJudge' ? '✓ Cannot judge' : 'Cannot judge'}
      </Button>
    </Box>
  );
}
