/**
 * The one place where colours, type and shape are named. `theme.ts` turns these into an MUI theme with one set of CSS
 * variables per scheme; nothing else in the web application writes a colour.
 *
 * In the dome scheme every colour is a red: a control room keeps its people's eyes adapted to the dark, and one stray
 * white or green pixel undoes that. `tokens.test.ts` checks hue and contrast.
 */
export interface ColourTokens {
  /** Page ground. */
  ground: string;
  /** Ground of cards, tables, menus. */
  surface: string;
  /** Ground of computed columns and notes. */
  raised: string;
  ink: string;
  inkSoft: string;
  /** Hairlines between things that are told apart by more than the line. */
  line: string;
  /** Outline of inputs and other things whose edge must be seen: at least 3 : 1. */
  edge: string;
  primary: string;
  onPrimary: string;
  accent: string;
  good: string;
  warn: string;
  bad: string;
  /** Redshift ramp, from near to far; anchors in `redshiftAnchors`. */
  redshift0: string;
  redshift1: string;
  redshift2: string;
  redshift3: string;
  redshift4: string;
  redshift5: string;
  moon: string;
  night: string;
  /** Text selection. */
  selection: string;
  /** Behind dialogs. */
  veil: string;
}

export type SchemeName = 'light' | 'dark' | 'dome';

/** The redshifts at which the ramp takes its named colours; between them it is mixed. */
export const redshiftAnchors = [0, 2, 4, 7, 10, 14] as const;

export const paper: ColourTokens = {
  ground: '#f6f2ea',
  surface: '#fffdf8',
  raised: '#fbf7ee',
  ink: '#1c2321',
  inkSoft: '#55605b',
  line: '#d9d2c3',
  edge: '#8c8675',
  primary: '#1f4d3f',
  onPrimary: '#fffdf8',
  accent: '#a4562a',
  good: '#2f6b45',
  warn: '#8a5a00',
  bad: '#a3312a',
  redshift0: '#4f7299',
  redshift1: '#6b7199',
  redshift2: '#8b6b8a',
  redshift3: '#a3604f',
  redshift4: '#9a4124',
  redshift5: '#762812',
  moon: '#e6dcbf',
  night: '#cfd6d3',
  selection: '#cfe0d6',
  veil: '#1c232173',
};

export const slate: ColourTokens = {
  ground: '#12171a',
  surface: '#1a2125',
  raised: '#20292d',
  ink: '#e9e4d8',
  inkSoft: '#a5ada9',
  line: '#323d41',
  edge: '#728086',
  primary: '#93c7b1',
  onPrimary: '#10201a',
  accent: '#e3a463',
  good: '#8cc79d',
  warn: '#e0b455',
  bad: '#ef8a7e',
  redshift0: '#8fb0d6',
  redshift1: '#a5a8d0',
  redshift2: '#c3a0c0',
  redshift3: '#dd9a83',
  redshift4: '#e07f58',
  redshift5: '#cf5e38',
  moon: '#5a533c',
  night: '#0d1113',
  selection: '#3b554b',
  veil: '#05080999',
};

export const dome: ColourTokens = {
  ground: '#080202',
  surface: '#100404',
  raised: '#180606',
  ink: '#f0584a',
  inkSoft: '#d34c41',
  line: '#3c1412',
  edge: '#aa3a31',
  primary: '#f0584a',
  onPrimary: '#140303',
  accent: '#ff7a66',
  good: '#f0584a',
  warn: '#ff7a66',
  bad: '#ff7a66',
  redshift0: '#a8372f',
  redshift1: '#b23c33',
  redshift2: '#c0443a',
  redshift3: '#d24b3f',
  redshift4: '#e65348',
  redshift5: '#ff6a5a',
  moon: '#2a0c0a',
  night: '#050101',
  selection: '#40100c',
  veil: '#080202b3',
};

export const schemes: Record<SchemeName, ColourTokens> = { light: paper, dark: slate, dome };

export const fonts = {
  sans: "'Source Sans 3 Variable', 'Source Sans 3', system-ui, sans-serif",
  serif: "'Source Serif 4 Variable', 'Source Serif 4', Georgia, serif",
  mono: "'Source Code Pro Variable', 'Source Code Pro', ui-monospace, monospace",
} as const;

/**
 * Pairs that carry text (4.5 : 1) or must be told apart as shapes (3 : 1), by WCAG 2.2 criteria 1.4.3 and 1.4.11.
 * The contrast test walks this list for every scheme.
 */
const grounds = ['ground', 'surface', 'raised'] as const;
export const textPairs: readonly (readonly [keyof ColourTokens, keyof ColourTokens])[] = [
  ...(['ink', 'inkSoft', 'primary', 'accent', 'good', 'warn', 'bad'] as const).flatMap((text) =>
    grounds.map((ground) => [text, ground] as const),
  ),
  ['onPrimary', 'primary'],
  ['onPrimary', 'bad'],
  ['onPrimary', 'accent'],
  ['ink', 'selection'],
];
export const shapePairs: readonly (readonly [keyof ColourTokens, keyof ColourTokens])[] = (
  ['edge', 'redshift0', 'redshift1', 'redshift2', 'redshift3', 'redshift4', 'redshift5'] as const
).flatMap((shape) => grounds.map((ground) => [shape, ground] as const));
