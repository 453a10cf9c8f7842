import type { DistanceRow } from '@faintward/contracts/distances';
import type { LightImage } from '@faintward/contracts/light-report';
import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import { formatNumber } from '../../lib/format';
import { Quantity, type Explanation } from '../Quantity';
import { dimmings, dimmingSource } from './explanations';
import { Figures } from './Figures';

const regimeWords: Record<LightImage['regime'], string> = {
  point: 'A point in this seeing: smaller than a fifth of its FWHM. What counts is the total light.',
  resolvedBySeeing: 'Comparable to the seeing: size and seeing both spread its light.',
  extended: 'Larger than twice the seeing: what counts is the light per square arcsecond, not the total.',
};

const sersic = 'Graham & Driver 2005, PASA 22, 118';

/** How large the source appears, how bright its surface is, and why surfaces fade with redshift. */
export function ImageBlock({
  image,
  distances,
  hasSize,
}: {
  image: LightImage;
  distances: DistanceRow;
  /** Without a size only the dimmings are told. */
  hasSize: boolean;
}) {
  return (
    <>
      {hasSize && <SizeFigures image={image} distances={distances} />}
      <Typography variant="h3" component="h3" sx={{ mt: hasSize ? 2.5 : 0, mb: 0.5 }}>
        How a surface fades with redshift
      </Typography>
      <Typography variant="body2" color="textSecondary" sx={{ mb: 1.25 }}>
        {hasSize && 'It is contained in the numbers above and is not taken off again. '}Which of the four holds depends
        on what is measured.
      </Typography>
      <Box component="dl" sx={{ m: 0, display: 'grid', gap: 1.25 }}>
        {dimmings.map((dimming) => (
          <Box
            key={dimming.field}
            sx={{ display: 'grid', gridTemplateColumns: '92px minmax(0, 1fr)', columnGap: 1.5, alignItems: 'baseline' }}
          >
            <Box component="dt" sx={{ gridColumn: 2, gridRow: 1 }}>
              {dimming.label}
              <Typography variant="body2" color="textSecondary" component="div">
                {dimming.why}
              </Typography>
            </Box>
            <Box component="dd" sx={{ m: 0, textAlign: 'right', gridRow: 1, gridColumn: 1 }}>
              <Quantity
                value={distances[dimming.field]}
                unit="mag"
                decimals={2}
                signed
                strong
                explanation={{
                  title: dimming.label,
                  meaning: dimming.why,
                  formula: dimming.formula,
                  inputs: [{ label: 'redshift z', value: formatNumber(distances.redshift, { decimals: 4 }) }],
                  source: dimmingSource,
                }}
              />
            </Box>
          </Box>
        ))}
      </Box>
    </>
  );
}

/** The surface brightnesses of a profile, before seeing. */
const surfaces = [
  {
    label: 'Surface brightness, mean',
    field: 'meanSurfaceBrightnessAbMagPerArcsec2',
    strong: true,
    explanation: {
      title: 'Mean surface brightness',
      meaning: 'Within the half-light radius, before seeing.',
      formula: '⟨µ⟩ = m + 2.5 log₁₀(2π r²)',
      source: sersic,
    },
  },
  {
    label: 'at the half-light radius',
    field: 'effectiveSurfaceBrightnessAbMagPerArcsec2',
    strong: false,
    explanation: {
      title: 'Surface brightness at the half-light radius',
      meaning: 'From the profile’s Sérsic index n.',
      formula: 'µ_e = ⟨µ⟩ + 2.5 log₁₀[n eᵇ b⁻²ⁿ Γ(2n)]',
      source: sersic,
    },
  },
  {
    label: 'in the centre',
    field: 'centralSurfaceBrightnessAbMagPerArcsec2',
    strong: false,
    explanation: {
      title: 'Central surface brightness',
      meaning: 'Of the profile before seeing, which flattens it.',
      formula: 'µ₀ = µ_e − 2.5 b / ln 10',
      source: sersic,
    },
  },
  {
    label: 'The same surface without expansion',
    field: 'restSurfaceBrightnessAbMagPerArcsec2',
    strong: false,
    explanation: {
      title: 'Without expansion',
      meaning: 'What the mean surface brightness would be if redshift dimmed nothing.',
      formula: '⟨µ⟩ − 7.5 log₁₀(1 + z)',
      source: dimmingSource,
    },
  },
] as const;

/** Radii, surface brightnesses and what the seeing makes of them. */
function SizeFigures({ image, distances }: { image: LightImage; distances: DistanceRow }) {
  const size: Explanation = {
    title: 'Half-light radius',
    meaning: 'Holds half of the light, above the atmosphere.',
    formula: 'angle = size / scale',
    inputs: [{ label: 'scale', value: `${formatNumber(distances.kpcPerArcsec, { decimals: 3 })} kpc/″` }],
    ...(image.source ? { source: image.source } : {}),
  };
  return (
    <>
      <Typography sx={{ mb: 1.5 }}>{regimeWords[image.regime]}</Typography>
      <Figures
        figures={[
          {
            label: 'Half-light radius',
            node: (
              <>
                <Quantity value={image.halfLightRadiusArcsec} unit="″" decimals={3} explanation={size} strong />
                {image.halfLightRadiusKpc !== null && (
                  <>
                    {', '}
                    <Quantity value={image.halfLightRadiusKpc} unit="kpc" significant={3} />
                  </>
                )}
              </>
            ),
          },
          {
            label: 'After seeing',
            value: image.halfLightRadiusAfterSeeingArcsec,
            unit: '″',
            decimals: 3,
            strong: true,
            explanation: {
              title: 'Half-light radius in this seeing',
              formula: '√(r² + (FWHM/2)²)',
              inputs: [
                {
                  label: 'seeing at this wavelength, FWHM',
                  value: `${formatNumber(image.seeingFwhmArcsec, { decimals: 2 })}″`,
                },
              ],
              source: 'common practice; within 4 % for disks, 14 % for steep profiles',
            },
          },
          ...surfaces.map(({ label, field, strong, explanation }) => ({
            label,
            value: image[field],
            unit: 'AB/″²',
            decimals: 2,
            strong,
            explanation,
          })),
        ]}
      />
    </>
  );
}
