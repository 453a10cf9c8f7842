import type { RankingRow } from '@faintward/contracts/reviews';
import type { HoursByMoonClass } from '@faintward/contracts/semesters';
import Box from '@mui/material/Box';
import { formatNumber } from '../../../lib/format';
import { colour } from '../../../theme/theme';

const scaleEnd = 10;

/** Mean with the span from the lowest to the highest score, on the scale from 0 to 10. */
export function ScoreSpan({ row }: { row: RankingRow }) {
  if (row.meanScore === null)
    return (
      <Box component="span" sx={{ color: 'text.secondary' }}>
        no score yet
      </Box>
    );
  const width = 150;
  const x = (score: number) => 6 + (score / scaleEnd) * (width - 12);
  const text = `${formatNumber(row.meanScore, { decimals: 2 })}, from ${formatNumber(row.lowestScore, { decimals: 1 })} to ${formatNumber(row.highestScore, { decimals: 1 })}`;
  return (
    <Box component="span" sx={{ display: 'inline-flex', alignItems: 'center', gap: 1.25 }}>
      <svg width={width} height="18" role="img" aria-label={text}>
        <line x1={x(0)} x2={x(scaleEnd)} y1="9" y2="9" stroke={colour.line} />
        <line
          x1={x(row.lowestScore ?? 0)}
          x2={x(row.highestScore ?? 0)}
          y1="9"
          y2="9"
          stroke={colour.inkSoft}
          strokeWidth="2"
        />
        {row.scores.map((one, index) => (
          <line
            key={index}
            x1={x(one.score)}
            x2={x(one.score)}
            y1="5"
            y2="13"
            stroke={colour.inkSoft}
            strokeWidth="1.5"
          />
        ))}
        <circle cx={x(row.meanScore)} cy="9" r="5" fill={colour.primary} />
      </svg>
      <strong>{formatNumber(row.meanScore, { decimals: 2 })}</strong>
    </Box>
  );
}

const classes = ['dark', 'grey', 'bright'] as const;

/** Hours used up down to this row, a bar for each moon class; full bars are what exists. */
export function CumulatedHours({ row, available }: { row: RankingRow; available: HoursByMoonClass }) {
  return (
    <Box
      component="span"
      sx={{
        display: 'grid',
        gridTemplateColumns: '38px 84px auto',
        columnGap: 1,
        fontSize: '0.75rem',
        lineHeight: 1.35,
      }}
    >
      {classes.map((moonClass) => {
        const used = row.cumulatedHours[moonClass];
        const exists = available[moonClass];
        const share = exists > 0 ? used / exists : used > 0 ? 2 : 0;
        const isOver = used > exists + 1e-9;
        return (
          <Box key={moonClass} component="span" sx={{ display: 'contents' }}>
            <Box component="span" sx={{ color: 'text.secondary' }}>
              {moonClass}
            </Box>
            <svg width="84" height="12" aria-hidden="true" style={{ alignSelf: 'center' }}>
              <rect x="0" y="3" width="70" height="6" rx="1.5" fill={colour.line} />
              <rect
                x="0"
                y="3"
                width={Math.min(84, share * 70)}
                height="6"
                rx="1.5"
                fill={isOver ? colour.bad : colour.primary}
              />
              <line x1="70" x2="70" y1="0" y2="12" stroke={colour.accent} strokeWidth="1.5" />
            </svg>
            <Box component="span" sx={{ color: isOver ? 'error.main' : 'text.secondary' }}>
              {formatNumber(used, { decimals: 0 })}
              {isOver ? ' over' : ''}
            </Box>
          </Box>
        );
      })}
    </Box>
  );
}

/** "13.7 dark, 2.0 grey"; with the unit " h" where no table head says it. */
export function hoursText(hours: HoursByMoonClass, unit: '' | ' h' = ''): string {
  const parts = classes
    .filter((moonClass) => hours[moonClass] > 0)
    .map((moonClass) => `${formatNumber(hours[moonClass], { decimals: 1 })}${unit} ${moonClass}`);
  return parts.length > 0 ? parts.join(', ') : `0${unit}`;
}
