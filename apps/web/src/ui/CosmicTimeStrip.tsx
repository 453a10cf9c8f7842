import { useMemo } from 'react';
import Box from '@mui/material/Box';
import { counted, formatNumber } from '../lib/format';
import { redshiftColour } from '../theme/redshiftColour';
import { colour } from '../theme/theme';
import { CosmicTimeDiscs, type PlacedDisc } from './CosmicTimeDiscs';
import { columnsOf, discRadius, roomForDiscs, spacedMarks, timeAxis, type TimeAxis } from './cosmicTime';
import { PlotFigure, type PlotTable } from './plot/PlotFigure';
import { useWidth } from './plot/useWidth';
import { PlotText } from './plot/PlotText';

export interface CosmicTimePoint {
  targetId: string;
  name: string;
  redshift: number;
  ageGyr: number;
  hours: number | null;
}

export interface CosmicTimeStripProps {
  /** Ages come from the server, in the proposal's cosmology. */
  points: readonly CosmicTimePoint[];
  /** Redshifts to mark above the line, each with the age it belongs to. */
  ticks: readonly { redshift: number; ageGyr: number }[];
  /** Round ages to mark below the line, each with its redshift. */
  ageTicks: readonly { redshift: number; ageGyr: number }[];
  ageTodayGyr: number;
  title?: string;
  /** Opens a target; without it a disc only says what it is. */
  onChoose?: (targetId: string) => void;
}

/** More targets than this are counted in columns: the table behind the picture has each of them. */
const mostReached = 300;
const columnWidth = 7;
const columnHeight = 56;

/**
 * Where the light set out: targets along cosmic time, redshift above, age below, disc area by the hours asked. Discs that
 * would cover each other leave the line; very many targets are counted in columns instead. Even in
 * ln(1+z) when most targets lie beyond z 4, where time alone would crowd them at the left; else even in time.
 */
export function CosmicTimeStrip({
  points,
  ticks,
  ageTicks,
  ageTodayGyr,
  title = 'Where the light set out',
  onChoose,
}: CosmicTimeStripProps) {
  const [box, width] = useWidth(900);
  const left = 18;
  const right = width - 42;
  const axis = useMemo(
    () => timeAxis(points, ticks, ageTodayGyr, left, right),
    [points, ticks, ageTodayGyr, left, right],
  );
  const maxHours = Math.max(0, ...points.map((point) => point.hours ?? 0));
  const isCrowded = points.length > mostReached;
  const { placed, offsets, reach } = useMemo(() => {
    const all = isCrowded
      ? []
      : points.map((point) => ({
          point,
          x: axis.at(point),
          radius: discRadius(point.hours, maxHours, points.length),
        }));
    return { placed: all, ...roomForDiscs(all) };
  }, [points, axis, maxHours, isCrowded]);
  const above = isCrowded ? columnHeight + 18 : reach;
  const lineY = 22 + above;
  const bottom = lineY + (isCrowded ? 8 : reach);
  const discs = useMemo<PlacedDisc[]>(
    () =>
      placed
        .map((disc, index) => ({ ...disc, y: lineY + (offsets[index] ?? 0) }))
        .toSorted((a, b) => b.point.redshift - a.point.redshift),
    [placed, offsets, lineY],
  );

  const redshiftMarks = spacedMarks(ticks, axis, left, 34);
  const ageMarks = spacedMarks([{ redshift: 0, ageGyr: ageTodayGyr }, ...ageTicks], axis, left, 40);
  const description = `${counted(points.length, 'target')} along cosmic time, ${
    axis.kind === 'time' ? 'even in time' : 'even in ln(1+z)'
  }${spanInWords(points)}`;

  return (
    <PlotFigure
      title={title}
      description="Targets along cosmic time"
      table={tableOf(points)}
      fileName="cosmic-time.csv"
      box={box}
    >
      <Box sx={{ position: 'relative' }}>
        <svg
          width={width}
          height={bottom + 46}
          role="img"
          aria-label={description}
          style={{ display: 'block', overflow: 'visible' }}
        >
          <g fontSize="12" fill={colour.inkSoft} textAnchor="middle">
            {redshiftMarks.map((mark) => (
              <g key={mark.redshift}>
                <line x1={mark.x} x2={mark.x} y1="18" y2={lineY} stroke={colour.line} />
                <line x1={mark.x} x2={mark.x} y1={lineY - 6} y2={lineY} stroke={colour.inkSoft} />
                <text x={mark.x} y="12">
                  {mark.redshift}
                </text>
              </g>
            ))}
            {ageMarks.map((mark) => (
              <g key={mark.ageGyr}>
                <line x1={mark.x} x2={mark.x} y1={lineY} y2={lineY + 6} stroke={colour.inkSoft} />
                <text x={mark.x} y={bottom + 16}>
                  {mark.redshift === 0 ? 'today' : mark.ageGyr}
                </text>
              </g>
            ))}
          </g>
          <line x1={left} x2={right} y1={lineY} y2={lineY} stroke={colour.edge} strokeWidth="1.5" />
          <g fontSize="12" fill={colour.inkSoft}>
            <text x={right + 14} y="12">
              z
            </text>
            <text x={right + (width < 480 ? 18 : 24)} y={bottom + 16}>
              Gyr
            </text>
          </g>
          {isCrowded && <Columns points={points} axis={axis} lineY={lineY} />}
          {discs
            .toSorted((a, b) => b.radius - a.radius)
            .map(({ point, x, y, radius }) => (
              <g key={point.targetId}>
                {y !== lineY && <line x1={x} x2={x} y1={lineY} y2={y} stroke={colour.inkSoft} strokeOpacity="0.5" />}
                <circle
                  cx={x}
                  cy={y}
                  r={radius}
                  fill={redshiftColour(point.redshift)}
                  fillOpacity="0.85"
                  stroke={colour.surface}
                />
              </g>
            ))}
          <text x={(left + right) / 2} y={bottom + 38} textAnchor="middle" fontSize="12" fill={colour.inkSoft}>
            {caption(width, isCrowded ? 'columns: number of targets' : maxHours > 0 ? 'disc area: hours asked' : null)}
          </text>
        </svg>
        {!isCrowded && <CosmicTimeDiscs discs={discs} {...(onChoose ? { onChoose } : {})} />}
      </Box>
    </PlotFigure>
  );
}

/** Many targets as columns, the tallest with its number. */
function Columns({ points, axis, lineY }: { points: readonly CosmicTimePoint[]; axis: TimeAxis; lineY: number }) {
  const columns = columnsOf(points, axis, columnWidth);
  const most = Math.max(...columns.map((column) => column.count));
  const tallest = columns.find((column) => column.count === most);
  return (
    <g>
      {columns.map((column) => {
        const height = Math.max(1, (column.count / most) * columnHeight);
        return (
          <rect
            key={column.x}
            x={column.x + 0.5}
            width={columnWidth - 1}
            y={lineY - height}
            height={height}
            fill={redshiftColour(column.redshift)}
          />
        );
      })}
      {tallest && (
        <PlotText x={tallest.x + columnWidth / 2} y={lineY - columnHeight - 4} textAnchor="middle">
          {formatNumber(most, { decimals: 0 })}
        </PlotText>
      )}
    </g>
  );
}

function caption(width: number, size: string | null): string {
  const axes = width < 480 ? 'redshift above, age below' : 'age of the Universe when the light set out, redshift above';
  return size ? `${axes} · ${size}` : axes;
}

function spanInWords(points: readonly CosmicTimePoint[]): string {
  if (points.length === 0) return '';
  const redshifts = points.map((point) => point.redshift);
  const text = (value: number) => formatNumber(value, { decimals: 2 });
  const low = Math.min(...redshifts);
  const high = Math.max(...redshifts);
  return low === high ? `: z ${text(low)}` : `: z ${text(low)} to ${text(high)}`;
}

function tableOf(points: readonly CosmicTimePoint[]): PlotTable {
  return {
    header: ['Target', 'Redshift', 'Age (Gyr)', 'Hours asked'],
    fileHeader: ['name', 'redshift', 'age_gyr', 'hours'],
    rows: points.map((point) => [point.name, point.redshift, point.ageGyr, point.hours]),
    format: (value, column) =>
      formatNumber(value, column === 1 ? { decimals: 3 } : column === 3 ? { decimals: 1 } : {}),
  };
}
