import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Collapse from '@mui/material/Collapse';
import Typography from '@mui/material/Typography';
import { useId, useMemo, useState } from 'react';
import { downloadText, toCsv } from '../lib/csv';
import { counted, formatNumber } from '../lib/format';
import { redshiftColour } from '../theme/redshiftColour';
import { colour } from '../theme/theme';
import { RedshiftValue } from './RedshiftValue';
import { useWidth } from './plot/useWidth';

export interface CosmicTimeStripProps {
  /** Ages come from the server, in the proposal's cosmology. */
  points: readonly { targetId: string; name: string; redshift: number; ageGyr: number; hours: number | null }[];
  /** Redshifts to mark above the line, each with the age it belongs to. */
  ticks: readonly { redshift: number; ageGyr: number }[];
  /** Round ages to mark below the line, each with its redshift. */
  ageTicks: readonly { redshift: number; ageGyr: number }[];
  ageTodayGyr: number;
  title?: string;
}

/**
 * Where the light set out: targets along cosmic time, redshift above, age below, disc area by the hours asked. Even in
 * ln(1+z) when most targets lie beyond z 4, where time alone would crowd them at the left; else even in time.
 */
export function CosmicTimeStrip({
  points,
  ticks,
  ageTicks,
  ageTodayGyr,
  title = 'Where the light set out',
}: CosmicTimeStripProps) {
  const [box, width] = useWidth(900);
  const [tableOpen, setTableOpen] = useState(false);
  const id = useId();
  const farCount = points.filter((point) => point.redshift > 4).length;
  const evenInTime = farCount * 2 <= points.length;
  const left = 22;
  const right = width - 54;
  const maxRedshift = Math.max(
    1,
    ...points.map((point) => point.redshift * 1.12),
    ...(points.length === 0 ? ticks.map((tick) => tick.redshift) : []),
  );
  const place = (point: { redshift: number; ageGyr: number }) =>
    evenInTime
      ? left + (point.ageGyr / ageTodayGyr) * (right - left)
      : right - (Math.log1p(point.redshift) / Math.log1p(maxRedshift)) * (right - left);

  const [redshiftMarks, ageMarks] = useMemo(() => {
    const spaced = (list: typeof ticks) => {
      // From today backwards, leaving out what would touch its neighbour.
      const shown: { redshift: number; ageGyr: number; x: number }[] = [];
      for (const tick of list.toSorted((a, b) => a.redshift - b.redshift)) {
        const x = place(tick);
        const previous = shown.at(-1);
        if (x >= left - 1 && (!previous || previous.x - x >= 40)) shown.push({ ...tick, x });
      }
      return shown;
    };
    return [spaced(ticks), spaced([{ redshift: 0, ageGyr: ageTodayGyr }, ...ageTicks])];
    // eslint-disable-next-line react-hooks/exhaustive-deps -- `place` is made of exactly these
  }, [ticks, ageTicks, width, evenInTime, maxRedshift, ageTodayGyr]);

  const maxHours = Math.max(0, ...points.map((point) => point.hours ?? 0));
  const radius = (hours: number | null) => (maxHours > 0 ? 4 + 9 * Math.sqrt((hours ?? 0) / maxHours) : 5);
  const y = 46;
  const drawn = points.toSorted((a, b) => (b.hours ?? 0) - (a.hours ?? 0));
  return (
    <Box component="figure" ref={box} aria-labelledby={id} sx={{ minWidth: 0 }}>
      <Box component="figcaption" id={id} sx={{ display: 'flex', gap: 1, alignItems: 'baseline' }}>
        <Typography variant="h3" component="span" sx={{ flex: 1 }}>
          {title}
        </Typography>
        <Button size="small" variant="text" aria-expanded={tableOpen} onClick={() => setTableOpen(!tableOpen)}>
          {tableOpen ? 'Hide the numbers' : 'Numbers'}
        </Button>
        <Button
          size="small"
          variant="text"
          onClick={() =>
            downloadText(
              'cosmic-time.csv',
              toCsv(
                ['name', 'redshift', 'age_gyr', 'hours'],
                points.map((point) => [point.name, point.redshift, point.ageGyr, point.hours]),
              ),
            )
          }
        >
          CSV
        </Button>
      </Box>
      <svg
        width={width}
        height="106"
        role="img"
        aria-label={`${counted(points.length, 'target')} along cosmic time, ${evenInTime ? 'even in time' : 'even in ln(1+z)'}`}
        style={{ display: 'block', overflow: 'visible' }}
      >
        <line x1={left} x2={right} y1={y} y2={y} stroke={colour.line} strokeWidth="2" />
        <g fontSize="12" fill={colour.inkSoft} textAnchor="middle">
          {redshiftMarks.map((tick) => (
            <g key={tick.redshift}>
              <line x1={tick.x} x2={tick.x} y1={y - 7} y2={y} stroke={colour.inkSoft} />
              <text x={tick.x} y={y - 17}>
                {tick.redshift}
              </text>
            </g>
          ))}
          {ageMarks.map((tick) => (
            <g key={tick.ageGyr}>
              <line x1={tick.x} x2={tick.x} y1={y} y2={y + 7} stroke={colour.inkSoft} />
              <text x={tick.x} y={y + 32}>
                {tick.redshift === 0 ? 'today' : tick.ageGyr}
              </text>
            </g>
          ))}
        </g>
        <text x={right + 14} y={y - 17} fontSize="12" fill={colour.inkSoft}>
          z
        </text>
        <text x={right + 24} y={y + 32} fontSize="12" fill={colour.inkSoft}>
          Gyr
        </text>
        {drawn.map((point) => (
          <circle
            key={point.targetId}
            cx={place(point)}
            cy={y}
            r={radius(point.hours)}
            fill={redshiftColour(point.redshift)}
            fillOpacity="0.82"
            stroke={colour.surface}
          >
            <title>{`${point.name}: z ${formatNumber(point.redshift, { decimals: 3 })}, ${formatNumber(point.ageGyr)} Gyr${point.hours == null ? '' : `, ${formatNumber(point.hours, { decimals: 1 })} h`}`}</title>
          </circle>
        ))}
        <text x={(left + right) / 2} y="100" textAnchor="middle" fontSize="12" fill={colour.inkSoft}>
          {width < 560
            ? 'redshift above, age of the Universe below'
            : 'age of the Universe when the light set out, redshift above · disc area: hours asked'}
        </text>
      </svg>
      <Collapse in={tableOpen} unmountOnExit>
        <Box
          tabIndex={0}
          role="region"
          aria-label="Targets along cosmic time"
          sx={{ maxHeight: 260, overflow: 'auto' }}
        >
          <Box
            component="table"
            sx={{
              borderCollapse: 'collapse',
              fontSize: '0.8125rem',
              '& th, & td': { textAlign: 'right', px: 1.25, py: 0.5, borderBottom: 1, borderColor: 'divider' },
              '& tbody th, & thead th:first-of-type': { textAlign: 'left' },
            }}
          >
            <thead>
              <tr>
                <th scope="col">Target</th>
                <th scope="col">Redshift</th>
                <th scope="col">Age (Gyr)</th>
                <th scope="col">Hours asked</th>
              </tr>
            </thead>
            <tbody>
              {points.map((point) => (
                <tr key={point.targetId}>
                  <th scope="row">{point.name}</th>
                  <td>
                    <RedshiftValue redshift={point.redshift} />
                  </td>
                  <td>{formatNumber(point.ageGyr)}</td>
                  <td>{formatNumber(point.hours, { decimals: 1 })}</td>
                </tr>
              ))}
            </tbody>
          </Box>
        </Box>
      </Collapse>
    </Box>
  );
}
