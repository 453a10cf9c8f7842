import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Collapse from '@mui/material/Collapse';
import Typography from '@mui/material/Typography';
import { useId, useState, type ReactNode } from 'react';
import { downloadText, toCsv } from '../../lib/csv';
import { formatNumber } from '../../lib/format';
import { colour } from '../../theme/theme';
import { extent, makeScale, type Scale } from './scale';
import { useWidth } from './useWidth';

export interface PlotAxis {
  label: string;
  unit?: string;
  scale?: 'linear' | 'log';
  /** Without it, what the series need. */
  domain?: readonly [number, number];
  format?: (value: number) => string;
}

export interface PlotSeries {
  kind: 'line' | 'points' | 'band';
  label: string;
  /** `high` only for a band, whose lower edge is `y`. Values that are null break the line. */
  values: readonly { x: number; y: number | null; high?: number | null }[];
  colour?: string;
  dashed?: boolean;
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
  /** Further marks, drawn with the plot's scales. */
  children?: (scales: { x: Scale; y: Scale; width: number; height: number }) => ReactNode;
}

const margin = { top: 12, right: 16, bottom: 46, left: 62 };

/** A plot for reading: axes with units, names beside their lines, and behind it the data as a table and a file. */
export function PlotFrame({ title, description, x, y, series, height = 280, fileName, children }: PlotFrameProps) {
  const [box, width] = useWidth(640);
  const [tableOpen, setTableOpen] = useState(false);
  const id = useId();

  const labelled = series.filter((one) => one.showLabel !== false && one.values.length > 0);
  const labelWidth = labelled.length > 0 ? Math.max(...labelled.map((one) => one.label.length)) * 6.6 + 10 : 0;
  const right = Math.min(width * 0.34, Math.max(margin.right, labelWidth));
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
  const labels = placeLabels(
    labelled.flatMap((one) => {
      const last = one.values.findLast((value) => value.y != null && Number.isFinite(yScale(value.y)));
      return last ? [{ label: one.label, x: xScale(last.x) + 6, y: yScale(last.y!) + 4 }] : [];
    }),
    margin.top + 8,
    bottom,
  );
  const table = toTable(x, y, series);

  return (
    <Box component="figure" ref={box} aria-labelledby={id} sx={{ minWidth: 0 }}>
      <Box
        component="figcaption"
        id={id}
        sx={{ display: 'flex', gap: 1, alignItems: 'baseline', flexWrap: 'wrap', mb: 0.5 }}
      >
        <Typography variant="h3" component="span" sx={{ flex: 1 }}>
          {title}
        </Typography>
        <Button size="small" variant="text" aria-expanded={tableOpen} onClick={() => setTableOpen(!tableOpen)}>
          {tableOpen ? 'Hide the numbers' : 'Numbers'}
        </Button>
        <Button size="small" variant="text" onClick={() => downloadText(fileName, toCsv(table.header, table.rows))}>
          CSV
        </Button>
      </Box>
      <svg
        width={width}
        height={height}
        role="img"
        aria-label={description}
        style={{ display: 'block', overflow: 'visible' }}
      >
        {yScale.ticks.map((tick) => (
          <g key={tick}>
            <line x1={left} x2={width - right} y1={yScale(tick)} y2={yScale(tick)} stroke={colour.line} />
            <text x={left - 8} y={yScale(tick) + 4} textAnchor="end" fontSize="12" fill={colour.inkSoft}>
              {(y.format ?? tickText)(tick)}
            </text>
          </g>
        ))}
        {xScale.ticks.map((tick) => (
          <g key={tick}>
            <line x1={xScale(tick)} x2={xScale(tick)} y1={bottom} y2={bottom + 5} stroke={colour.inkSoft} />
            <text x={xScale(tick)} y={bottom + 18} textAnchor="middle" fontSize="12" fill={colour.inkSoft}>
              {(x.format ?? tickText)(tick)}
            </text>
          </g>
        ))}
        <line x1={left} x2={width - right} y1={bottom} y2={bottom} stroke={colour.inkSoft} />
        <text x={(left + width - right) / 2} y={height - 8} textAnchor="middle" fontSize="12" fill={colour.inkSoft}>
          {axisTitle(x)}
        </text>
        <text
          transform={`translate(13 ${(margin.top + bottom) / 2}) rotate(-90)`}
          textAnchor="middle"
          fontSize="12"
          fill={colour.inkSoft}
        >
          {axisTitle(y)}
        </text>
        {series.map((one, index) => (
          <SeriesMark key={one.label} series={one} x={xScale} y={yScale} colour={one.colour ?? seriesColour(index)} />
        ))}
        {labels.map((label) => (
          <text
            key={label.label}
            x={label.x}
            y={label.y}
            fontSize="12"
            fill={colour.ink}
            stroke={colour.surface}
            strokeWidth="3"
            paintOrder="stroke"
          >
            {label.label}
          </text>
        ))}
        {children?.({ x: xScale, y: yScale, width, height })}
      </svg>
      <Collapse in={tableOpen} unmountOnExit>
        <Box
          tabIndex={0}
          role="region"
          aria-label={`Numbers: ${description}`}
          sx={{ maxHeight: 260, overflow: 'auto', mt: 1 }}
        >
          <PlainTable header={table.header} rows={table.rows} />
        </Box>
      </Collapse>
    </Box>
  );
}

const seriesColours = [colour.primary, colour.accent, colour.inkSoft, colour.warn];
function seriesColour(index: number): string {
  return seriesColours[index % seriesColours.length]!;
}

function tickText(value: number): string {
  if (value !== 0 && (Math.abs(value) >= 1e5 || Math.abs(value) < 1e-3)) return formatNumber(value, { significant: 1 });
  return String(value).replace('-', '−');
}

function axisTitle(axis: PlotAxis): string {
  return axis.unit ? `${axis.label} (${axis.unit})` : axis.label;
}

function SeriesMark({ series, x, y, colour: stroke }: { series: PlotSeries; x: Scale; y: Scale; colour: string }) {
  const placed = (value: number | null | undefined) => value != null && Number.isFinite(y(value));
  if (series.kind === 'points') {
    return (
      <g fill={stroke} stroke={colour.surface}>
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
    return <path d={`M${[...upper, ...lower].join('L')}Z`} fill={stroke} fillOpacity="0.16" />;
  }
  let path = '';
  let penDown = false;
  for (const value of series.values) {
    const usable = placed(value.y) && Number.isFinite(x(value.x));
    if (usable) path += `${penDown ? 'L' : 'M'}${x(value.x).toFixed(1)},${y(value.y!).toFixed(1)}`;
    penDown = usable;
  }
  return (
    <path d={path} fill="none" stroke={stroke} strokeWidth="2" {...(series.dashed ? { strokeDasharray: '6 4' } : {})} />
  );
}

/** Moves labels apart where they would overlap, keeping their order. */
function placeLabels<Label extends { y: number }>(labels: Label[], top: number, bottom: number): Label[] {
  const gap = 15;
  const sorted = labels.toSorted((a, b) => a.y - b.y).map((label) => ({ ...label }));
  for (let index = 0; index < sorted.length; index += 1) {
    const above = sorted[index - 1];
    const current = sorted[index]!;
    current.y = Math.max(current.y, above ? above.y + gap : top);
  }
  for (let index = sorted.length - 1; index >= 0; index -= 1) {
    const below = sorted[index + 1];
    const current = sorted[index]!;
    current.y = Math.min(current.y, below ? below.y - gap : bottom);
  }
  return sorted;
}

interface PlainTableData {
  header: string[];
  rows: (number | null)[][];
}

function toTable(x: PlotAxis, y: PlotAxis, series: readonly PlotSeries[]): PlainTableData {
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

function PlainTable({ header, rows }: PlainTableData) {
  return (
    <Box
      component="table"
      sx={{
        borderCollapse: 'collapse',
        fontSize: '0.8125rem',
        '& th, & td': { textAlign: 'right', px: 1.25, py: 0.5, borderBottom: 1, borderColor: 'divider' },
        '& th': { color: 'text.secondary', position: 'sticky', top: 0, bgcolor: 'background.paper' },
      }}
    >
      <thead>
        <tr>
          {header.map((label) => (
            <th key={label} scope="col">
              {label}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <tr key={row[0]}>
            {row.map((value, index) => (
              <td key={index}>{formatNumber(value)}</td>
            ))}
          </tr>
        ))}
      </tbody>
    </Box>
  );
}
