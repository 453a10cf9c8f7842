import { alpha, createTheme } from '@mui/material/styles';
import type {} from '@mui/x-data-grid/themeAugmentation';
import { fonts, schemes, type ColourTokens, type SchemeName } from './tokens';

/** Colours that MUI has no name for. `theme.vars.palette.faintward.raised` and so on. */
export interface FaintwardPalette {
  raised: string;
  line: string;
  edge: string;
  accent: string;
  moon: string;
  night: string;
  z0: string;
  z1: string;
  z2: string;
  z3: string;
  z4: string;
  z5: string;
}

declare module '@mui/material/styles' {
  interface Palette {
    faintward: FaintwardPalette;
  }
  interface PaletteOptions {
    faintward?: FaintwardPalette;
  }
  interface ColorSchemeOverrides {
    dome: true;
  }
  interface TypographyVariants {
    reading: React.CSSProperties;
    figure: React.CSSProperties;
  }
  interface TypographyVariantsOptions {
    reading?: React.CSSProperties;
    figure?: React.CSSProperties;
  }
}
declare module '@mui/material/Typography' {
  interface TypographyPropsVariantOverrides {
    reading: true;
    figure: true;
  }
}

function scheme(name: SchemeName, tokens: ColourTokens) {
  const one = (main: string) => ({ main, light: main, dark: main, contrastText: tokens.onPrimary });
  return {
    palette: {
      mode: name === 'light' ? ('light' as const) : ('dark' as const),
      common: { black: name === 'dome' ? tokens.ground : '#000', white: name === 'dome' ? tokens.ink : '#fff' },
      background: { default: tokens.ground, paper: tokens.surface },
      text: { primary: tokens.ink, secondary: tokens.inkSoft, disabled: alpha(tokens.inkSoft, 0.7) },
      divider: tokens.line,
      primary: one(tokens.primary),
      secondary: one(tokens.accent),
      error: one(tokens.bad),
      warning: one(tokens.warn),
      success: one(tokens.good),
      info: one(tokens.primary),
      grey: Object.fromEntries(
        [50, 100, 200, 300, 400, 500, 600, 700, 800, 900, 'A100', 'A200', 'A400', 'A700'].map((step, index) => [
          step,
          index < 4 ? tokens.raised : index < 7 ? tokens.line : tokens.inkSoft,
        ]),
      ),
      action: {
        active: tokens.inkSoft,
        hover: alpha(tokens.primary, 0.08),
        hoverOpacity: 0.08,
        selected: alpha(tokens.primary, 0.12),
        selectedOpacity: 0.12,
        focus: alpha(tokens.primary, 0.14),
        focusOpacity: 0.14,
        disabled: alpha(tokens.inkSoft, 0.6),
        disabledBackground: alpha(tokens.inkSoft, 0.16),
      },
      Tooltip: { bg: tokens.ink },
      SnackbarContent: { bg: tokens.ink, color: tokens.surface },
      DataGrid: { bg: tokens.surface, headerBg: tokens.surface, pinnedBg: tokens.raised },
      faintward: {
        raised: tokens.raised,
        line: tokens.line,
        edge: tokens.edge,
        accent: tokens.accent,
        moon: tokens.moon,
        night: tokens.night,
        z0: tokens.redshift0,
        z1: tokens.redshift1,
        z2: tokens.redshift2,
        z3: tokens.redshift3,
        z4: tokens.redshift4,
        z5: tokens.redshift5,
      },
    },
    overlays: Array.from({ length: 25 }, () => 'none') as never,
  };
}

const perScheme = (pick: (tokens: ColourTokens) => Record<string, unknown>) =>
  Object.fromEntries(
    (Object.keys(schemes) as SchemeName[]).map((name) => [`html[data-theme='${name}']`, pick(schemes[name])]),
  );

/**
 * The theme. Flat: no shadows but a hairline, because these pages are read beside other papers; the eye should find
 * the figures, not the furniture.
 */
export const theme = createTheme({
  cssVariables: { cssVarPrefix: 'fw', colorSchemeSelector: 'data-theme' },
  defaultColorScheme: 'light',
  colorSchemes: {
    light: scheme('light', schemes.light),
    dark: scheme('dark', schemes.dark),
    dome: scheme('dome', schemes.dome),
  },
  shape: { borderRadius: 5 },
  shadows: Array.from({ length: 25 }, () => 'none') as never,
  breakpoints: { values: { xs: 0, sm: 600, md: 900, lg: 1200, xl: 1600 } },
  typography: {
    fontFamily: fonts.sans,
    fontSize: 15,
    htmlFontSize: 16,
    h1: { fontFamily: fonts.serif, fontWeight: 600, fontSize: '1.875rem', lineHeight: 1.2, letterSpacing: '-0.005em' },
    h2: { fontFamily: fonts.serif, fontWeight: 600, fontSize: '1.25rem', lineHeight: 1.3 },
    h3: { fontFamily: fonts.serif, fontWeight: 600, fontSize: '1rem', lineHeight: 1.35 },
    h4: { fontFamily: fonts.serif, fontWeight: 600, fontSize: '0.9375rem', lineHeight: 1.4 },
    h5: { fontFamily: fonts.sans, fontWeight: 600, fontSize: '0.9375rem' },
    h6: { fontFamily: fonts.sans, fontWeight: 600, fontSize: '0.875rem' },
    body1: { fontSize: '0.9375rem', lineHeight: 1.45 },
    body2: { fontSize: '0.8125rem', lineHeight: 1.45 },
    subtitle1: { fontSize: '0.9375rem', fontWeight: 600 },
    subtitle2: { fontSize: '0.8125rem', fontWeight: 600 },
    caption: { fontSize: '0.8125rem', lineHeight: 1.35 },
    overline: { fontSize: '0.8125rem', textTransform: 'none', letterSpacing: 0, lineHeight: 1.4 },
    button: { fontWeight: 600, fontSize: '0.875rem', textTransform: 'none', letterSpacing: 0 },
    reading: { fontFamily: fonts.serif, fontSize: '1.0625rem', lineHeight: 1.6 },
    figure: { fontFamily: fonts.mono, fontSize: '0.8125rem' },
  },
  components: {
    MuiCssBaseline: {
      styleOverrides: {
        body: { fontVariantNumeric: 'tabular-nums lining-nums', fontFeatureSettings: 'normal' },
        ...perScheme((tokens) => ({
          '--fw-veil': tokens.veil,
          scrollbarColor: `${tokens.edge} ${tokens.surface}`,
          accentColor: tokens.primary,
          caretColor: tokens.primary,
          '& ::selection': { background: tokens.selection, color: tokens.ink },
          '& ::-webkit-scrollbar': { width: 12, height: 12 },
          '& ::-webkit-scrollbar-thumb': {
            background: tokens.edge,
            borderRadius: 6,
            border: `3px solid ${tokens.surface}`,
          },
          '& ::-webkit-scrollbar-track, & ::-webkit-scrollbar-corner': { background: tokens.surface },
          // Browsers paint filled-in fields in a colour of their own; only an inset shadow covers it.
          '& input:-webkit-autofill, & input:-webkit-autofill:hover, & input:-webkit-autofill:focus, & select:-webkit-autofill, & textarea:-webkit-autofill':
            {
              WebkitTextFillColor: tokens.ink,
              WebkitBoxShadow: `0 0 0 100px ${tokens.raised} inset`,
              caretColor: tokens.ink,
              borderRadius: 'inherit',
            },
        })),
        "html[data-theme='dome'] img, html[data-theme='dome'] canvas, html[data-theme='dome'] video": {
          // Pictures that people upload are not ours to draw; in the dome they are turned to red.
          filter: 'grayscale(1) brightness(0.7) sepia(1) saturate(6) hue-rotate(-45deg)',
        },
        ':focus-visible': { outline: '2px solid var(--fw-palette-faintward-accent)', outlineOffset: 2 },
        'h1, h2, h3, h4, p, dl, dd, figure': { margin: 0 },
        a: { color: 'inherit' },
        '@media (prefers-reduced-motion: reduce)': {
          '*, *::before, *::after': {
            animationDuration: '0.01ms !important',
            animationIterationCount: '1 !important',
            transitionDuration: '0.01ms !important',
            scrollBehavior: 'auto !important',
          },
          // Places of rectangles are styles too, those of lines and texts are not: a picture must change at once as a whole.
          'svg *': { transition: 'none !important' },
        },
      },
    },
    MuiButtonBase: {
      defaultProps: { disableRipple: true },
      styleOverrides: {
        root: {
          '&.Mui-focusVisible': { outline: '2px solid var(--fw-palette-faintward-accent)', outlineOffset: 2 },
        },
      },
    },
    MuiButton: {
      defaultProps: { disableElevation: true, variant: 'outlined' },
      styleOverrides: { root: { borderRadius: 5, paddingInline: 14, whiteSpace: 'nowrap' } },
    },
    MuiPaper: { defaultProps: { elevation: 0 }, styleOverrides: { root: { backgroundImage: 'none' } } },
    MuiAppBar: { defaultProps: { elevation: 0, color: 'transparent' } },
    MuiCard: { defaultProps: { variant: 'outlined' } },
    MuiMenu: {
      styleOverrides: { paper: { border: '1px solid var(--fw-palette-faintward-edge)' } },
    },
    MuiPopover: {
      styleOverrides: { paper: { border: '1px solid var(--fw-palette-faintward-edge)' } },
    },
    MuiDialog: {
      styleOverrides: { paper: { border: '1px solid var(--fw-palette-faintward-edge)' } },
    },
    MuiBackdrop: {
      styleOverrides: {
        root: {
          '&:not(.MuiBackdrop-invisible)': { backgroundColor: 'var(--fw-veil)' },
        },
      },
    },
    MuiDialogTitle: { styleOverrides: { root: { fontFamily: fonts.serif, fontWeight: 600, fontSize: '1.25rem' } } },
    MuiTextField: { defaultProps: { size: 'small', fullWidth: true } },
    MuiFormControl: { defaultProps: { size: 'small' } },
    MuiSelect: { defaultProps: { size: 'small' } },
    MuiOutlinedInput: {
      styleOverrides: {
        root: {
          background: 'var(--fw-palette-background-paper)',
          '& .MuiOutlinedInput-notchedOutline': { borderColor: 'var(--fw-palette-faintward-edge)' },
          '&:hover .MuiOutlinedInput-notchedOutline': { borderColor: 'var(--fw-palette-text-secondary)' },
        },
      },
    },
    MuiInputAdornment: { styleOverrides: { root: { color: 'var(--fw-palette-text-secondary)' } } },
    MuiFormHelperText: { styleOverrides: { root: { marginInline: 2 } } },
    MuiTooltip: {
      defaultProps: { arrow: false, enterDelay: 400 },
      styleOverrides: {
        tooltip: {
          fontSize: '0.8125rem',
          background: 'var(--fw-palette-background-paper)',
          color: 'var(--fw-palette-text-primary)',
          border: '1px solid var(--fw-palette-faintward-edge)',
        },
      },
    },
    MuiTableCell: {
      styleOverrides: {
        root: { padding: '7px 10px', borderColor: 'var(--fw-palette-divider)', fontSize: '0.875rem' },
        head: { fontWeight: 600, fontSize: '0.8125rem', color: 'var(--fw-palette-text-secondary)', lineHeight: 1.3 },
      },
    },
    MuiAlert: {
      styleOverrides: {
        root: {
          background: 'var(--fw-palette-faintward-raised)',
          color: 'var(--fw-palette-text-primary)',
          borderRadius: 0,
          borderLeft: '3px solid currentColor',
          padding: '4px 14px',
          fontSize: '0.875rem',
        },
      },
    },
    MuiLink: { defaultProps: { underline: 'hover', color: 'primary' } },
    MuiChip: { styleOverrides: { root: { borderRadius: 4, fontWeight: 500 } } },
    MuiTabs: { styleOverrides: { indicator: { backgroundColor: 'var(--fw-palette-faintward-accent)' } } },
    MuiLinearProgress: { styleOverrides: { root: { height: 2, background: 'transparent' } } },
  },
});

/** The value of a token as a CSS variable, for SVG and plain styles. */
export const colour = {
  ink: 'var(--fw-palette-text-primary)',
  inkSoft: 'var(--fw-palette-text-secondary)',
  ground: 'var(--fw-palette-background-default)',
  surface: 'var(--fw-palette-background-paper)',
  raised: 'var(--fw-palette-faintward-raised)',
  line: 'var(--fw-palette-faintward-line)',
  edge: 'var(--fw-palette-faintward-edge)',
  primary: 'var(--fw-palette-primary-main)',
  accent: 'var(--fw-palette-faintward-accent)',
  good: 'var(--fw-palette-success-main)',
  warn: 'var(--fw-palette-warning-main)',
  bad: 'var(--fw-palette-error-main)',
  moon: 'var(--fw-palette-faintward-moon)',
  night: 'var(--fw-palette-faintward-night)',
} as const;
