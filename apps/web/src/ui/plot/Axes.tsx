import { formatNumber } from '../../lib/format';
import { colour } from '../../theme/theme';
import type { Scale } from './scale';

export interface PlotAxis {
  label: string;
  unit?: string;
  scale?: 'linear' | 'log';
  /** Without it, what the series need. The larger value first turns the axis round, as magnitudes are drawn. */
  domain?: readonly [number, number];
  format?: (value: number) => string;
  /** Where ticks stand, when the usual round numbers do not suit. */
  ticks?: readonly number[];
}

function tickText(value: number): string {
  if (value !== 0 && (Math.abs(value) >= 1e5 || Math.abs(value) < 1e-3)) return formatNumber(value, { significant: 1 });
  return String(value).replace('-', '−');
}

export function axisTitle(axis: PlotAxis): string {
  return axis.unit ? `${axis.label} (${axis.unit})` : axis.label;
}

/** Ticks and title under a plot that reaches from `left` to `right`; `titleY` is where its title stands. */
export function AxisBelow({
  axis,
  scale,
  left,
  right,
  y,
  titleY,
}: {
  axis: PlotAxis;
  scale: Scale;
  left: number;
  right: number;
  y: number;
  titleY: number;
}) {
  return (
    <g fontSize="12" fill={colour.inkSoft} textAnchor="middle">
      {(axis.ticks ?? scale.ticks).map((tick) => (
        <g key={tick}>
          <line x1={scale(tick)} x2={scale(tick)} y1={y} y2={y + 5} stroke={colour.inkSoft} />
          <text x={scale(tick)} y={y + 18}>
            {(axis.format ?? tickText)(tick)}
          </text>
        </g>
      ))}
      <line x1={left} x2={right} y1={y} y2={y} stroke={colour.inkSoft} />
      <text x={(left + right) / 2} y={titleY}>
        {axisTitle(axis)}
      </text>
    </g>
  );
}

/** Grid lines with their values at the left, and the title along the side. */
export function AxisBeside({
  axis,
  scale,
  left,
  right,
  top,
  bottom,
}: {
  axis: PlotAxis;
  scale: Scale;
  left: number;
  right: number;
  top: number;
  bottom: number;
}) {
  return (
    <g fontSize="12" fill={colour.inkSoft}>
      {(axis.ticks ?? scale.ticks).map((tick) => (
        <g key={tick}>
          <line x1={left} x2={right} y1={scale(tick)} y2={scale(tick)} stroke={colour.line} />
          <text x={left - 8} y={scale(tick) + 4} textAnchor="end">
            {(axis.format ?? tickText)(tick)}
          </text>
        </g>
      ))}
      <text transform={`translate(13 ${(top + bottom) / 2}) rotate(-90)`} textAnchor="middle">
        {axisTitle(axis)}
      </text>
    </g>
  );
}
