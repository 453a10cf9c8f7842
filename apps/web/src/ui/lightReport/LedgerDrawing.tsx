import { useId } from 'react';
import { formatNumber } from '../../lib/format';
import { colour } from '../../theme/theme';
import type { LedgerLayout } from './ledger';
import { PlotText } from '../plot/PlotText';

/** Bars, axis and links of a ledger. Text of the rows stands over it, where it can be reached and wrapped. */
export function LedgerDrawing({
  layout,
  width,
  description,
  isCutOff,
}: {
  layout: LedgerLayout;
  width: number;
  description: string;
  isCutOff: boolean;
}) {
  const hatch = useId();
  const { axis, axisY, rows, stages, isNarrow, plotLeft, plotRight } = layout;
  const bottom = layout.height;
  return (
    <svg
      width={width}
      height={bottom + (isCutOff ? 6 : 0)}
      role="img"
      aria-label={description}
      style={{ display: 'block', overflow: 'visible' }}
    >
      <defs>
        <pattern id={hatch} width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
          <line x1="0" x2="0" y1="0" y2="5" stroke={colour.good} strokeWidth="4" strokeOpacity="0.5" />
        </pattern>
      </defs>
      {stages.map((stage) => (
        <line key={stage.stage} x1="0" x2={width} y1={stage.top} y2={stage.top} stroke={colour.line} />
      ))}
      <g fontSize="12" fill={colour.inkSoft}>
        <text x={plotLeft} y="11">
          AB magnitude, faint at the right
        </text>
        {!isNarrow && (
          <text x={width} y={axisY} textAnchor="end">
            total
          </text>
        )}
        {axis.pieces.flatMap((piece) =>
          piece.ticks.map((tick) => (
            <g key={tick}>
              <line x1={axis.at(tick)} x2={axis.at(tick)} y1={axisY + 4} y2={bottom} stroke={colour.line} />
              <text x={axis.at(tick)} y={axisY} textAnchor="middle">
                {formatNumber(tick, { decimals: Math.min(2, String(tick).split('.')[1]?.length ?? 0) })}
              </text>
            </g>
          )),
        )}
        {axis.breaks.map((x) => (
          <BreakMark key={x} x={x} top={axisY - 8} height={12} />
        ))}
      </g>
      {rows.map(({ row, barTop, barHeight }, index) => {
        const from = axis.at(row.fromMag);
        const to = axis.at(row.totalMag);
        const left = Math.min(from, to);
        const size = Math.max(row.kind === 'start' ? 5 : 2, Math.abs(to - from));
        const next = rows[index + 1];
        const crossed = axis.breaks.filter((x) => x > left && x < left + size);
        return (
          <g key={row.id}>
            {next && (
              <line
                x1={to}
                x2={to}
                y1={barTop + barHeight}
                y2={next.barTop}
                stroke={colour.inkSoft}
                strokeDasharray="2 2"
              />
            )}
            <Bar
              x={row.kind === 'start' ? left - 2.5 : left}
              y={barTop}
              width={size}
              height={barHeight}
              kind={row.kind === 'step' ? directionOf(row.deltaMag) : row.kind}
              hatch={`url(#${hatch})`}
            />
            {crossed.map((x) => (
              <BreakMark key={x} x={x} top={barTop - 3} height={barHeight + 6} />
            ))}
            {!isNarrow && row.kind !== 'start' && (
              <PlotText x={left + size + 7} y={barTop + barHeight / 2 + 4} fontSize="12.5">
                {formatNumber(row.deltaMag, { decimals: 2, signed: true })}
              </PlotText>
            )}
          </g>
        );
      })}
      {isCutOff && rows.length > 0 && (
        <g stroke={colour.bad} strokeWidth="2">
          <line x1={plotLeft} x2={plotRight} y1={bottom + 3} y2={bottom + 3} strokeDasharray="6 4" />
          <line
            x1={axis.at(rows.at(-1)!.row.totalMag)}
            x2={axis.at(rows.at(-1)!.row.totalMag)}
            y1={rows.at(-1)!.barTop + rows.at(-1)!.barHeight}
            y2={bottom + 3}
          />
        </g>
      )}
    </svg>
  );
}

type BarKind = 'start' | 'loss' | 'gain' | 'none' | 'aperture';

/** What rounds to 0.00 mag is neither loss nor gain. */
function directionOf(deltaMag: number): BarKind {
  if (Math.abs(deltaMag) < 0.005) return 'none';
  return deltaMag < 0 ? 'gain' : 'loss';
}

/** Losses are filled, gains hatched, what an aperture leaves is an outline: told apart without colour. */
function Bar({
  kind,
  hatch,
  ...place
}: {
  x: number;
  y: number;
  width: number;
  height: number;
  kind: BarKind;
  hatch: string;
}) {
  if (kind === 'start') return <rect {...place} rx="1.5" fill={colour.primary} />;
  if (kind === 'none') return <rect {...place} fill={colour.inkSoft} />;
  if (kind === 'loss') return <rect {...place} rx="1.5" fill={colour.accent} fillOpacity="0.88" />;
  if (kind === 'gain') return <rect {...place} rx="1.5" fill={hatch} stroke={colour.good} />;
  return <rect {...place} rx="1.5" fill="none" stroke={colour.accent} strokeDasharray="3 2" />;
}

/** Two slanted strokes with a gap between them: the axis leaves something out here. */
function BreakMark({ x, top, height }: { x: number; top: number; height: number }) {
  const slant = height * 0.28;
  return (
    <g>
      <path d={`M${x - 4} ${top} h6 l${slant} ${height} h-6 Z`} fill={colour.surface} stroke="none" />
      <path
        d={`M${x - 4} ${top} l${slant} ${height} M${x + 2} ${top} l${slant} ${height}`}
        stroke={colour.inkSoft}
        fill="none"
      />
    </g>
  );
}
