import type { ReactNode } from 'react';
import { colour } from '../../theme/theme';
import { AxisBelow, AxisBeside, axisTitle, type PlotAxis } from './Axes';
import { spreadLabels, textWidth } from './labels';
import { PlotFigure, type PlotTable } from './PlotFigure';
import { extent, makeScale, type Scale } from './scale';
import { useWidth } from './useWidth';
import { PlotText } from './PlotText';

export type { PlotAxis } from './Axes';

export interface PlotSeries {
  kind: 'line' | 'points' | 'band';
  label: string;
  /** `high` only for a band, whose lower edge is `y`. Values that are null break the line. */
  values: readonly { x: number; y: number | null; high?: number | null }[];
  colour?: string;
  /** A pattern of strokes and gaps, or true for the usual one. */
  dashed?: boolean | string;
  /** Written beside the series' last value; false for helpers that need no name. */
  showLabel?: boolean;
}

export interface PlotFrameProps {
  title: ReactNode;
  /** What the picture shows, in a sentence: its text alternative. */
  description: string;
  x: PlotAxis;
  y: PlotAxis;
  series: readonly PlotSeries[];
  height?: number;
  fileName: string;
  /** One quiet line under the title. */
  note?: ReactNode;
  /** Further marks, drawn with the plot's scales. */
  children?: (scales: { x: Scale; y: Scale; width: number; height: number }) => ReactNode;
}

const margin = { top: 12, right: 16, bottom: 46, left: 62 };

/** A plot for reading: axes with units, names beside their lines, and behind it the data as a table and a file. */
export function PlotFrame({
  title,
  note,
  description,
  x,
  y,
  series,
  height = 280,
  fileName,
  children,
}: PlotFrameProps) {
  const [box, width] = useWidth(640);

  const labelled = series.filter((one) => one.showLabel !== false && one.values.length > 0);
  // Several names stand each behind a piece of its own line, because they are moved apart where lines end together.
  const leader = labelled.length > 1 ? 24 : 6;
  const labelWidth = labelled.length > 0 ? Math.max(...labelled.map((one) => textWidth(one.label))) + leader + 6 : 0;
  const right = Math.min(width * (width < 480 ? 0.42 : 0.34), Math.max(margin.right, labelWidth));
  const left = margin.left;
  const bottom = height - margin.bottom;
  const xKind = x.scale ?? 'linear';
  const yKind = y.scale ?? 'linear';
  const xScale = makeScale(
    xKind,
    x.domain ??
      extent(
        series.flatMap((one) => one.values.map((value) => value.x)),
        xKind === 'log',
      ),
    [left, width - right],
    Math.max(3, Math.floor((width - left - right) / 52)),
  );
  const yScale = makeScale(
    yKind,
    y.domain ??
      extent(
        series.flatMap((one) => one.values.flatMap((value) => [value.y ?? NaN, value.high ?? NaN])),
        yKind === 'log',
      ),
    [bottom, margin.top],
    5,
  );
  const labels = spreadLabels(
    labelled.flatMap((one) => {
      const last = one.values.findLast((value) => value.y != null && Number.isFinite(yScale(value.y)));
      if (!last) return [];
      const end = { x: xScale(last.x), y: yScale(last.y!) };
      const text = cutText(one.label, right - leader - 2);
      return [{ key: one.label, text, end, y: end.y + 4, stroke: strokeOf(one, series.indexOf(one)) }];
    }),
    margin.top + 8,
    bottom,
  );
  const table = toTable(x, y, series);

  return (
    <PlotFigure title={title} note={note} description={description} table={table} fileName={fileName} box={box}>
      <svg
        width={width}
        height={height}
        role="img"
        aria-label={description}
        style={{ display: 'block', overflow: 'visible' }}
      >
        <AxisBeside axis={y} scale={yScale} left={left} right={width - right} top={margin.top} bottom={bottom} />
        <AxisBelow axis={x} scale={xScale} left={left} right={width - right} y={bottom} titleY={height - 8} />
        {series.map((one, index) => (
          <SeriesMark key={one.label} series={one} x={xScale} y={yScale} stroke={strokeOf(one, index)} />
        ))}
        {labels.map(({ key, text, end, y: labelY, stroke }) => (
          <g key={key}>
            {labels.length > 1 && (
              <path
                d={`M${end.x} ${end.y} L${end.x + 6} ${labelY - 4} h${leader - 10}`}
                fill="none"
                strokeWidth="1.5"
                {...stroke}
              />
            )}
            <PlotText x={end.x + leader} y={labelY}>
              {text}
            </PlotText>
          </g>
        ))}
        {children?.({ x: xScale, y: yScale, width, height })}
      </svg>
    </PlotFigure>
  );
}

const seriesColours = [colour.primary, colour.accent, colour.inkSoft, colour.warn];

interface Stroke {
  stroke: string;
  strokeDasharray?: string;
}

/** How a series is drawn, and the piece of line before its name. */
function strokeOf(series: PlotSeries, index: number): Stroke {
  const stroke = series.colour ?? seriesColours[index % seriesColours.length]!;
  if (!series.dashed) return { stroke };
  return { stroke, strokeDasharray: typeof series.dashed === 'string' ? series.dashed : '6 4' };
}

/** A name cut to the room there is; the table of numbers has it in full. */
function cutText(text: string, room: number): string {
  if (textWidth(text) <= room) return text;
  const letters = [...text];
  while (letters.length > 1 && textWidth(`${letters.join('')}…`) > room) letters.pop();
  return `${letters.join('').trimEnd()}…`;
}

function SeriesMark({ series, x, y, stroke }: { series: PlotSeries; x: Scale; y: Scale; stroke: Stroke }) {
  const placed = (value: number | null | undefined) => value != null && Number.isFinite(y(value));
  if (series.kind === 'points') {
    return (
      <g fill={stroke.stroke} stroke={colour.surface}>
        {series.values.map((value, index) =>
          placed(value.y) && Number.isFinite(x(value.x)) ? (
            <circle key={index} cx={x(value.x)} cy={y(value.y!)} r="4.5" />
          ) : null,
        )}
      </g>
    );
  }
  if (series.kind === 'band') {
    const usable = series.values.filter((value) => placed(value.y) && placed(value.high));
    if (usable.length === 0) return null;
    const upper = usable.map((value) => `${x(value.x).toFixed(1)},${y(value.high!).toFixed(1)}`);
    const lower = usable.toReversed().map((value) => `${x(value.x).toFixed(1)},${y(value.y!).toFixed(1)}`);
    return <path d={`M${[...upper, ...lower].join('L')}Z`} fill={stroke.stroke} fillOpacity="0.16" />;
  }
  let path = '';
  let penDown = false;
  for (const value of series.values) {
    const usable = placed(value.y) && Number.isFinite(x(value.x));
    if (usable) path += `${penDown ? 'L' : 'M'}${x(value.x).toFixed(1)},${y(value.y!).toFixed(1)}`;
    penDown = usable;
  }
  return <path d={path} fill="none" strokeWidth="2" {...stroke} />;
}

function toTable(x: PlotAxis, y: PlotAxis, series: readonly PlotSeries[]): PlotTable {
  const columns = series.flatMap((one) =>
    one.kind === 'band'
      ? [
          { label: `${one.label}, low`, at: new Map(one.values.map((value) => [value.x, value.y])) },
          { label: `${one.label}, high`, at: new Map(one.values.map((value) => [value.x, value.high ?? null])) },
        ]
      : [{ label: one.label, at: new Map(one.values.map((value) => [value.x, value.y])) }],
  );
  const xs = [...new Set(series.flatMap((one) => one.values.map((value) => value.x)))].sort((a, b) => a - b);
  const unit = y.unit ? ` (${y.unit})` : '';
  return {
    header: [axisTitle(x), ...columns.map((column) => `${column.label}${unit}`)],
    rows: xs.map((value) => [value, ...columns.map((column) => column.at.get(value) ?? null)]),
  };
}
