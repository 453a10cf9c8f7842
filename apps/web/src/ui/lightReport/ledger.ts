import type { LightStep } from '@faintward/contracts/estimates';
import { formatNumber } from '../../lib/format';
import { linearTicks } from '../plot/scale';

/** A step, as far as a drawing needs it. */
export type LedgerStep = Pick<LightStep, 'id' | 'stage' | 'title' | 'deltaMag' | 'totalMag'> &
  Partial<Pick<LightStep, 'formula' | 'inputs' | 'source'>>;

export type LedgerStage = LightStep['stage'] | 'aperture';

export const stageWords: Record<LedgerStage, string> = {
  source: 'The source',
  space: 'On the way',
  atmosphere: 'Atmosphere',
  instrument: 'Telescope, instrument',
  counting: 'Counting',
  aperture: 'In an aperture',
};

/** A row of the picture: the start, a step from one running total to the next, or what an aperture leaves. */
export interface LedgerRow extends Omit<LedgerStep, 'stage'> {
  kind: 'start' | 'step' | 'aperture';
  stage: LedgerStage;
  fromMag: number;
}

export interface LedgerAperture {
  radiusArcsec: number;
  seeingArcsec: number;
  enclosedFraction: number;
  magnitudeAb: number;
}

/** The rows of a ledger, with the aperture at the end where there is one. */
export function ledgerRows(steps: readonly LedgerStep[], aperture?: LedgerAperture | null): LedgerRow[] {
  const rows = steps.map<LedgerRow>((step, index) => ({
    ...step,
    kind: index === 0 ? 'start' : 'step',
    fromMag: index === 0 ? step.totalMag : steps[index - 1]!.totalMag,
  }));
  const last = rows.at(-1);
  if (!last || !aperture) return rows;
  return [
    ...rows,
    {
      id: 'report-aperture',
      kind: 'aperture',
      stage: 'aperture',
      title: `Light outside ${formatNumber(aperture.radiusArcsec, { decimals: 2 })}″ radius`,
      fromMag: last.totalMag,
      deltaMag: aperture.magnitudeAb - last.totalMag,
      totalMag: aperture.magnitudeAb,
      formula: '−2.5 log10 of the enclosed fraction',
      inputs: [
        { name: 'radius', value: aperture.radiusArcsec, unit: '″' },
        { name: 'seeing, FWHM', value: aperture.seeingArcsec, unit: '″' },
        { name: 'enclosed', value: 100 * aperture.enclosedFraction, unit: '%' },
      ],
      source: 'the image in the seeing given; not a part of the ledger’s sum',
    },
  ];
}

/** Totals further apart than this are drawn on separate pieces of the axis. */
const breakBeyondMag = 8;
const leastSpreadMag = 0.5;
/** Pixels that a break takes, and the width of a piece that holds one value. */
const breakWidth = 22;
const loneWidth = 38;

export interface AxisPiece {
  lowMag: number;
  highMag: number;
  /** Pixels, bright at the left. */
  from: number;
  to: number;
  ticks: readonly number[];
}

export interface BrokenAxis {
  at: (mag: number) => number;
  pieces: readonly AxisPiece[];
  /** Middle of each break. */
  breaks: readonly number[];
}

/**
 * An axis of magnitudes that leaves out what lies empty between far groups of totals, so that a step of 0.01 mag stays
 * readable beside the distance modulus. Within a piece magnitudes are even; order is kept throughout.
 */
export function brokenAxis(totals: readonly number[], from: number, to: number): BrokenAxis {
  const groups: { low: number; high: number }[] = [];
  for (const total of totals.toSorted((a, b) => a - b)) {
    const last = groups.at(-1);
    if (last && total - last.high <= breakBeyondMag) last.high = total;
    else groups.push({ low: total, high: total });
  }
  // Totals that all but coincide still get an axis that can be read.
  for (const group of groups) {
    const lack = leastSpreadMag - (group.high - group.low);
    if (group.high > group.low && lack > 0) {
      group.low -= lack / 2;
      group.high += lack / 2;
    }
  }
  const isLone = (group: { low: number; high: number }) => group.high - group.low < 1e-9;
  const free = to - from - breakWidth * (groups.length - 1);
  const loneCount = groups.filter(isLone).length;
  const lone = loneCount === groups.length ? free / Math.max(1, loneCount) : Math.min(loneWidth, free / 6);
  const spread = groups.reduce((sum, group) => sum + (isLone(group) ? 0 : group.high - group.low), 0);
  const wide = free - lone * loneCount;
  const pieces: AxisPiece[] = [];
  let x = from;
  for (const group of groups) {
    const width = isLone(group) ? lone : (wide * (group.high - group.low)) / spread;
    // Room at both ends, so that no bar ends on the edge of its piece.
    const pad = isLone(group) ? 0.5 : (group.high - group.low) * 0.06;
    const lowMag = group.low - pad;
    const highMag = group.high + pad;
    const perPixel = (highMag - lowMag) / width;
    // Ticks close to a break would touch its strokes.
    const clear = 13 * perPixel;
    const ticks = isLone(group)
      ? [Math.round(group.low * 10) / 10]
      : linearTicks(lowMag, highMag, Math.max(2, Math.floor(width / 76))).filter(
          (tick) => tick >= lowMag + clear && tick <= highMag - clear,
        );
    pieces.push({ lowMag, highMag, from: x, to: x + width, ticks });
    x += width + breakWidth;
  }
  const at = (mag: number): number => {
    const after = pieces.findIndex((piece) => mag <= piece.highMag);
    const piece = pieces[after === -1 ? pieces.length - 1 : after];
    if (!piece) return from;
    const before = pieces[after - 1];
    if (before && mag < piece.lowMag) {
      const share = (mag - before.highMag) / (piece.lowMag - before.highMag);
      return before.to + share * (piece.from - before.to);
    }
    return piece.from + ((mag - piece.lowMag) / (piece.highMag - piece.lowMag)) * (piece.to - piece.from);
  };
  return { at, pieces, breaks: pieces.slice(1).map((piece) => piece.from - breakWidth / 2) };
}

export interface LedgerLayout {
  /** On a phone the bar stands below its name and numbers. */
  isNarrow: boolean;
  axis: BrokenAxis;
  axisY: number;
  /** Where the bars may stand, and where their numbers end. */
  plotLeft: number;
  plotRight: number;
  titleLeft: number;
  titleWidth: number;
  rows: readonly { row: LedgerRow; top: number; height: number; barTop: number; barHeight: number }[];
  stages: readonly { stage: LedgerStage; top: number; bottom: number; labelTop: number }[];
  height: number;
}

const axisHeight = 40;
/** A line of a title, and what one of its letters takes at most on average: too wide an estimate only gives more room. */
const titleLineHeight = 15;
const letterWidth = 6.6;
/** Change and total beside a title on a phone, with the gaps between them. */
const numbersWidthNarrow = 118;
/** Right of the axis, for the number beside the last bar. */
const labelRoom = 58;
const totalWidth = 58;

/** Where everything of a ledger stands in a drawing of this width. */
export function ledgerLayout(rows: readonly LedgerRow[], width: number): LedgerLayout {
  const isNarrow = width < 560;
  const lineHeight = isNarrow ? 50 : 32;
  const stageHeight = isNarrow ? 24 : 0;
  const titleLeft = isNarrow ? 0 : 96;
  const titleWidth = isNarrow ? width : Math.min(250, Math.max(168, width * 0.27));
  const titleRoom = isNarrow ? width - numbersWidthNarrow : titleWidth;
  const plotLeft = isNarrow ? 4 : titleLeft + titleWidth + 12;
  const plotRight = isNarrow ? width - 6 : width - totalWidth;
  const totals = rows.map((row) => row.totalMag);
  const axis = brokenAxis(totals, plotLeft, isNarrow ? plotRight : plotRight - labelRoom);
  const placed: LedgerLayout['rows'][number][] = [];
  const stages: { stage: LedgerStage; top: number; bottom: number; labelTop: number }[] = [];
  let y = axisHeight;
  for (const row of rows) {
    const open = stages.at(-1);
    if (open?.stage !== row.stage) {
      stages.push({ stage: row.stage, top: y, bottom: y, labelTop: y });
      y += stageHeight;
    }
    const barHeight = isNarrow ? 12 : 14;
    const isWrapped = row.title.length * letterWidth > titleRoom;
    const height = lineHeight + (isWrapped ? titleLineHeight : 0);
    placed.push({
      row,
      top: y,
      height,
      barTop: isNarrow ? y + height - 20 : y + (height - barHeight) / 2,
      barHeight,
    });
    y += height;
    stages.at(-1)!.bottom = y;
  }
  return {
    isNarrow,
    axis,
    axisY: axisHeight - 8,
    plotLeft,
    plotRight,
    titleLeft,
    titleWidth,
    rows: placed,
    stages,
    height: y,
  };
}

/** An input with its value: `luminosity distance 47000 Mpc`. */
export function inputText({ name, value, unit }: { name: string; value: number; unit: string }): string {
  return `${inputWords(name, unit)} ${value} ${unit}`.trim();
}

/** The name of an input in words: `luminosityDistanceMpc` in Mpc is a luminosity distance. Names in words stay. */
export function inputWords(name: string, unit: string): string {
  if (!/^[a-z]+(?:[A-Z0-9][a-z0-9]*)+$/.test(name)) return name;
  const words = name.replace(/([A-Z])/g, (letter) => ` ${letter.toLowerCase()}`);
  const end = ` ${unit.toLowerCase()}`;
  return unit !== '' && words.endsWith(end) ? words.slice(0, -end.length) : words;
}

/** The whole ledger in a sentence, for those who do not see it. */
export function ledgerSentence(rows: readonly LedgerRow[], what: string, reason?: string): string {
  const first = rows[0];
  const steps = rows.filter((row) => row.kind === 'step');
  const last = rows.findLast((row) => row.kind !== 'aperture');
  if (!first || !last) return `${what}: nothing to draw`;
  const magnitude = (value: number) => formatNumber(value, { decimals: 2 });
  const largest = steps.toSorted((a, b) => Math.abs(b.deltaMag) - Math.abs(a.deltaMag))[0];
  return [
    `${what}: ${first.title}, ${magnitude(first.totalMag)}`,
    steps.length === 0
      ? ''
      : `, then ${steps.length} ${steps.length === 1 ? 'step' : 'steps'} to a total of ${magnitude(last.totalMag)}`,
    largest
      ? `; the largest is ${largest.title}, ${formatNumber(largest.deltaMag, { decimals: 2, signed: true })} mag`
      : '',
    reason ? `. It stops there: ${reason}` : '',
  ].join('');
}
