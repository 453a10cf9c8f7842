import type { BandLight, LightReport, ObservedLine } from '@faintward/contracts/light-report';
import Box from '@mui/material/Box';
import { useId, useMemo } from 'react';
import { counted, formatNumber } from '../../lib/format';
import { colour } from '../../theme/theme';
import { AxisBelow, AxisBeside } from '../plot/Axes';
import { intoLanes, textWidth } from '../plot/labels';
import { makeScale, type Scale } from '../plot/scale';
import { abMagnitude, fluxUnit, largestDifference, magnitudeDomain, wavelengthTicks } from './spectrum';
import { PlotText } from '../plot/PlotText';

export const spectrumMargin = { left: 62, right: 10 } as const;
const plotHeight = 230;
const lineLane = 16;
const ribbon = 17;

type Point = { x: number; y: number };

/** Curves, lines and atmosphere of a spectrum. */
export function SpectrumDrawing({
  width,
  x,
  kind,
  range,
  quantity,
  arriving,
  unabsorbed,
  band,
  lines,
  atmosphere,
  description,
}: {
  width: number;
  x: Scale;
  kind: 'log' | 'linear';
  range: readonly [number, number];
  quantity: 'flux' | 'magnitude';
  arriving: readonly Point[];
  unabsorbed: readonly Point[];
  band: BandLight | undefined;
  lines: readonly ObservedLine[];
  atmosphere: LightReport['atmosphere'];
  description: string;
}) {
  const hatch = useId();
  const left = spectrumMargin.left;
  const right = width - spectrumMargin.right;
  const { placed, leftOut } = useMemo(() => placeLines(lines, range, x, left, right), [lines, range, x, left, right]);
  const unnamed = leftOut.flatMap((group) => group.lines);
  const laneCount = Math.max(0, ...placed.map((label) => label.lane + 1));
  const top = laneCount * lineLane + 8;
  const bottom = top + plotHeight;
  const axisY = bottom + ribbon;

  const largest = Math.max(0, ...arriving.map((point) => point.y), ...unabsorbed.map((point) => point.y));
  const { unit, perJy } = fluxUnit(largest);
  const isFlux = quantity === 'flux';
  const y = isFlux
    ? makeScale('linear', [0, largest * perJy * 1.18 || 1], [bottom, top], 5)
    : makeScale(
        'linear',
        magnitudeDomain([...arriving, ...unabsorbed].map((point) => abMagnitude(point.y))),
        [bottom, top],
        5,
      );
  const place = (jansky: number): number => {
    const value = isFlux ? jansky * perJy : abMagnitude(jansky);
    // What is fainter than the axis shows lies on its lower edge.
    return value === null ? bottom : Math.min(bottom, Math.max(top, y(value)));
  };
  const path = (points: readonly Point[]) =>
    points
      .map((point, index) => `${index === 0 ? 'M' : 'L'}${x(point.x).toFixed(1)},${place(point.y).toFixed(1)}`)
      .join('');
  const absorbed = largestDifference(arriving, unabsorbed);
  const end = arriving.findLast((point) => point.y > 0.02 * largest);

  return (
    <>
      <svg
        width={width}
        height={axisY + 42}
        role="img"
        aria-label={description}
        style={{ display: 'block', overflow: 'visible' }}
      >
        <defs>
          <pattern id={hatch} width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
            <line x1="0" x2="0" y1="0" y2="5" stroke={colour.edge} strokeWidth="1" />
          </pattern>
        </defs>
        <Atmosphere atmosphere={atmosphere} x={x} left={left} right={right} top={top} bottom={bottom} hatch={hatch} />
        {band && (
          <rect
            x={Math.max(left, x(band.wavelengthLowNm))}
            width={Math.max(0, Math.min(right, x(band.wavelengthHighNm)) - Math.max(left, x(band.wavelengthLowNm)))}
            y={top}
            height={plotHeight}
            fill={colour.primary}
            fillOpacity="0.1"
          />
        )}
        <AxisBeside
          axis={isFlux ? { label: 'flux density', unit } : { label: 'AB magnitude', format: (value) => String(value) }}
          scale={y}
          left={left}
          right={right}
          top={top}
          bottom={bottom}
        />
        <AxisBelow
          axis={{
            label: width < 480 ? 'observed wavelength, vacuum' : 'observed wavelength, in vacuum',
            unit: 'µm',
            ticks: wavelengthTicks(range, kind, x),
            format: (nm) => String(Number((nm / 1000).toPrecision(4))),
          }}
          scale={x}
          left={left}
          right={right}
          y={axisY}
          titleY={axisY + 36}
        />
        {placed.map(({ item, lane, from, to }) => (
          <LineMark
            key={item.lines[0]!.lineId}
            group={item}
            at={x}
            labelX={(from + to) / 2}
            labelY={lane * lineLane + 11}
            bottom={bottom}
          />
        ))}
        {unnamed.map((line) => (
          <line
            key={line.lineId}
            x1={x(line.observedWavelengthNm)}
            x2={x(line.observedWavelengthNm)}
            y1={bottom - 8}
            y2={bottom}
            stroke={colour.inkSoft}
          />
        ))}
        <path d={path(unabsorbed)} fill="none" stroke={colour.accent} strokeWidth="1.5" strokeDasharray="5 4" />
        <path d={path(arriving)} fill="none" stroke={colour.primary} strokeWidth="2" />
        {band?.fluxDensityJy != null && band.fluxDensityJy > 0 && (
          <circle
            cx={x(band.pivotWavelengthNm)}
            cy={place(band.fluxDensityJy)}
            r="5"
            fill={colour.surface}
            stroke={colour.primary}
            strokeWidth="2"
          />
        )}
        {absorbed && (
          <CurveLabel
            text="without absorption"
            x={clampLabel(x(absorbed.x), 'without absorption', left, right)}
            y={place(absorbed.y) - 8}
            anchor="middle"
          />
        )}
        {end && (
          <CurveLabel
            text={absorbed ? 'arriving' : 'arriving; nothing is absorbed here'}
            x={x(end.x) - 4}
            y={place(end.y) - 8}
            anchor="end"
          />
        )}
      </svg>
      {unnamed.length > 0 && (
        <Box sx={{ fontSize: '0.8125rem', color: 'text.secondary' }}>
          {counted(unnamed.length, 'line')} without room for a name here; all stand in the table of lines.
        </Box>
      )}
    </>
  );
}

/** Lines drawn under one name: several of one ion, when they are too close to tell apart. */
export interface LineGroup {
  label: string;
  lines: readonly ObservedLine[];
}

/** `Mg II 2796` is of Mg II. */
function ionOf(label: string): string {
  return label.replace(/\s\d+$/, '');
}

/** Names of the lines inside the range, each centred over its lines, in lanes. */
export function placeLines(
  lines: readonly ObservedLine[],
  range: readonly [number, number],
  at: (nm: number) => number,
  left: number,
  right: number,
) {
  const groups: { label: string; lines: ObservedLine[] }[] = [];
  for (const line of lines.toSorted((a, b) => a.observedWavelengthNm - b.observedWavelengthNm)) {
    if (line.observedWavelengthNm < range[0] || line.observedWavelengthNm > range[1]) continue;
    const near = groups.find(
      (group) =>
        ionOf(group.label) === ionOf(line.label) &&
        at(line.observedWavelengthNm) - at(group.lines.at(-1)!.observedWavelengthNm) < 30,
    );
    if (near) {
      near.lines.push(line);
      near.label = ionOf(near.label);
    } else groups.push({ label: line.label, lines: [line] });
  }
  const spans = groups.map((group) => {
    const width = textWidth(group.label) + 4;
    const middle = (at(group.lines[0]!.observedWavelengthNm) + at(group.lines.at(-1)!.observedWavelengthNm)) / 2;
    const from = Math.min(Math.max(left, middle - width / 2), right - width);
    return { item: group, from, to: from + width };
  });
  return intoLanes<LineGroup>(spans, 3);
}

function clampLabel(x: number, text: string, left: number, right: number): number {
  const half = textWidth(text) / 2 + 4;
  return Math.min(Math.max(x, left + half), right - half);
}

function CurveLabel({ text, x, y, anchor }: { text: string; x: number; y: number; anchor: 'middle' | 'end' }) {
  return (
    <PlotText x={x} y={y} textAnchor={anchor}>
      {text}
    </PlotText>
  );
}

/** Lines under their name: full where the atmosphere lets them through, dotted and slanted where it does not. */
function LineMark({
  group: { label, lines },
  at,
  labelX,
  labelY,
  bottom,
}: {
  group: LineGroup;
  at: (nm: number) => number;
  labelX: number;
  labelY: number;
  bottom: number;
}) {
  const comesThrough = lines.some((line) => line.place === 'window');
  return (
    <g>
      {lines.map((line) => (
        <line
          key={line.lineId}
          x1={at(line.observedWavelengthNm)}
          x2={at(line.observedWavelengthNm)}
          y1={labelY + 4}
          y2={bottom}
          stroke={colour.inkSoft}
          strokeOpacity={line.place === 'window' ? 0.7 : 0.5}
          {...(line.place === 'window' ? {} : { strokeDasharray: '1 4' })}
        />
      ))}
      <PlotText
        x={labelX}
        y={labelY}
        textAnchor="middle"
        fill={comesThrough ? colour.ink : colour.inkSoft}
        fontStyle={comesThrough ? 'normal' : 'italic'}
      >
        {label}
        <title>
          {lines
            .map(
              (line) =>
                `${line.label}, ${formatNumber(line.observedWavelengthNm, { decimals: 1 })} nm: ${line.placeLabel}`,
            )
            .join('; ')}
        </title>
      </PlotText>
    </g>
  );
}

/** Gaps of the atmosphere behind the curves, and a ribbon under the plot that names windows and gaps. */
function Atmosphere({
  atmosphere,
  x,
  left,
  right,
  top,
  bottom,
  hatch,
}: {
  atmosphere: LightReport['atmosphere'];
  x: Scale;
  left: number;
  right: number;
  top: number;
  bottom: number;
  hatch: string;
}) {
  return (
    <g fontSize="11" fill={colour.inkSoft} textAnchor="middle">
      {atmosphere.map((part) => {
        const from = Math.max(left, x(part.lowNm));
        const size = Math.min(right, x(part.highNm)) - from;
        if (size <= 0) return null;
        const isGap = part.kind === 'gap';
        return (
          <g key={`${part.label} ${part.lowNm}`}>
            {isGap && (
              <rect x={from} width={size} y={top} height={bottom - top} fill={`url(#${hatch})`} fillOpacity="0.28" />
            )}
            <rect
              x={from}
              width={size}
              y={bottom + 2}
              height={ribbon - 4}
              fill={isGap ? `url(#${hatch})` : colour.raised}
              stroke={colour.line}
            />
            {size > textWidth(part.label, 11) + 4 && (
              <text
                x={from + size / 2}
                y={bottom + ribbon - 5}
                stroke={isGap ? colour.surface : 'none'}
                strokeWidth="3"
                paintOrder="stroke"
              >
                {part.label}
              </text>
            )}
          </g>
        );
      })}
    </g>
  );
}
