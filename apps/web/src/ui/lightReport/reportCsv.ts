import type { LightReport } from '@faintward/contracts/light-report';
import { toCsv } from '../../lib/csv';

/** A report as one table: what it is about, which quantity, its value and unit, and why one is missing. */
export function reportCsv(report: LightReport): string {
  const { distances, ledger, image, uncertainty } = report;
  type Row = [string, string, string | number | null, string, string?];
  const rows: Row[] = [
    ['source', 'redshift', report.redshift, ''],
    ['source', 'absolute magnitude', report.absoluteMagnitudeAb, 'mag AB'],
    ['source', 'unlensed magnitude', report.unlensedMagnitudeAb, 'mag AB'],
    ['source', 'luminosity distance', distances.luminosityDistanceMpc, 'Mpc'],
    ['source', 'distance modulus', distances.distanceModulusMag, 'mag'],
    ['source', 'scale', distances.kpcPerArcsec, 'kpc/arcsec'],
    ['source', 'age', distances.ageGyr, 'Gyr'],
    ...(ledger?.steps ?? []).map((step): Row => [
      `light budget in ${ledger!.label}`,
      step.title,
      step.deltaMag,
      'mag',
      step.source,
    ]),
    ...(ledger
      ? [
          [
            `light budget in ${ledger.label}`,
            'total',
            ledger.totalMagnitudeAb,
            'mag AB',
            ledger.reason?.message ?? '',
          ] as Row,
        ]
      : []),
    ...report.bands.map((band): Row => ['band', band.label, band.magnitudeAb, 'mag AB', band.reason?.message ?? '']),
    ...report.lines.map((line): Row => [
      'line',
      line.label,
      line.observedWavelengthNm,
      'nm, vacuum',
      `${line.place}: ${line.placeLabel}`,
    ]),
    ['size', 'half-light radius', image.halfLightRadiusArcsec, 'arcsec', image.source ?? ''],
    ['size', 'half-light radius after seeing', image.halfLightRadiusAfterSeeingArcsec, 'arcsec'],
    ['size', 'mean surface brightness', image.meanSurfaceBrightnessAbMagPerArcsec2, 'mag AB/arcsec2'],
    ...(uncertainty
      ? (['p16', 'p50', 'p84'] as const).flatMap((which): Row[] => [
          ['uncertainty', `redshift ${which}`, uncertainty.redshift[which], ''],
          ['uncertainty', `magnitude ${which}`, uncertainty.magnitudeAb?.[which] ?? null, 'mag AB'],
        ])
      : []),
    ...report.cosmologies.map((row): Row => [
      'cosmology',
      row.title,
      row.distanceModulusMag,
      'mag, distance modulus',
      row.isChosen ? 'chosen' : '',
    ]),
    ['report', 'engine', report.engineVersion, ''],
    ['report', 'reference data', report.referenceDataVersion, ''],
    ['report', 'inputs', report.inputHash, ''],
  ];
  return toCsv(['part', 'quantity', 'value', 'unit', 'remark'], rows);
}
