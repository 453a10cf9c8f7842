import type { Extent } from '@faintward/contracts/light';
import type { Extent as EngineExtent } from '@faintward/exposure';
import { meanEffectiveSurfaceBrightness, typicalSizeKpc } from '@faintward/photometry';
import { lightData } from './light-data.js';

/** A size on the sky, with where it comes from. */
export interface ResolvedExtent {
  halfLightRadiusArcsec: number;
  halfLightRadiusKpc: number | null;
  sersicIndex: number;
  axisRatio: number;
  /** The relation that a typical size is read from; null for the investigator's own. */
  source: string | null;
}

export interface ExtentSetting {
  redshift: number;
  /** Undefined where there is no distance. */
  kpcPerArcsec: number | undefined;
  /** Lensing stretches what is given in kpc, which is the source's own size, by √μ. An angle is taken as observed. */
  magnification: number;
  /** For relations by luminosity; that of the relation where it is not known. */
  absoluteMagnitudeUv: number | undefined;
}

/** How large the source is seen, before seeing; null for a point, a surface, or a size in kpc without a distance. */
export function resolveExtent(extent: Extent, setting: ExtentSetting): ResolvedExtent | null {
  const { kpcPerArcsec, magnification } = setting;
  const stretch = Math.sqrt(magnification);
  switch (extent.kind) {
    case 'point':
    case 'uniform':
      return null;
    case 'typical': {
      if (kpcPerArcsec === undefined) return null;
      const halfLightRadiusKpc = typicalKpc(extent, setting);
      return {
        halfLightRadiusArcsec: (halfLightRadiusKpc / kpcPerArcsec) * stretch,
        halfLightRadiusKpc,
        sersicIndex: extent.sersicIndex,
        axisRatio: extent.axisRatio,
        source: lightData().typical.sizes[extent.relation].source,
      };
    }
    case 'sersic': {
      const { halfLightRadius, unit, sersicIndex, axisRatio } = extent;
      const shape = { sersicIndex, axisRatio, source: null };
      if (unit === 'arcsec') {
        const halfLightRadiusKpc = kpcPerArcsec === undefined ? null : (halfLightRadius * kpcPerArcsec) / stretch;
        return { halfLightRadiusArcsec: halfLightRadius, halfLightRadiusKpc, ...shape };
      }
      if (kpcPerArcsec === undefined) return null;
      return {
        halfLightRadiusArcsec: (halfLightRadius / kpcPerArcsec) * stretch,
        halfLightRadiusKpc: halfLightRadius,
        ...shape,
      };
    }
  }
}

/** Mean inside the half-light radius, before seeing, in AB mag/arcsec²; of an even surface what it is given as; null for a point. */
export function meanSurfaceBrightnessOf(
  extent: Extent,
  size: ResolvedExtent | null,
  magnitudeAb: number | null,
): number | null {
  if (magnitudeAb === null) return null;
  if (extent.kind === 'uniform') return magnitudeAb;
  return size === null ? null : meanEffectiveSurfaceBrightness(magnitudeAb, size.halfLightRadiusArcsec, size.axisRatio);
}

/** The same in the terms of the exposure engine. */
export function toEngineExtent(
  extent: Extent,
  setting: Pick<ExtentSetting, 'redshift' | 'absoluteMagnitudeUv'>,
): EngineExtent {
  switch (extent.kind) {
    case 'point':
    case 'uniform':
      return { kind: extent.kind };
    case 'typical':
      return {
        kind: 'sersic',
        index: extent.sersicIndex,
        axisRatio: extent.axisRatio,
        halfLightRadiusKpc: typicalKpc(extent, setting),
      };
    case 'sersic':
      return {
        kind: 'sersic',
        index: extent.sersicIndex,
        axisRatio: extent.axisRatio,
        ...(extent.unit === 'kpc'
          ? { halfLightRadiusKpc: extent.halfLightRadius }
          : { halfLightRadiusArcsec: extent.halfLightRadius }),
      };
  }
}

function typicalKpc(
  { relation, stellarMassSolar }: Extract<Extent, { kind: 'typical' }>,
  { redshift, absoluteMagnitudeUv }: Pick<ExtentSetting, 'redshift' | 'absoluteMagnitudeUv'>,
): number {
  return typicalSizeKpc(
    relation,
    redshift,
    { stellarMassSolar, ...(absoluteMagnitudeUv === undefined ? {} : { absoluteMagnitudeUv }) },
    lightData().typical,
  );
}
