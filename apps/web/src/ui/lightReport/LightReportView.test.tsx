import { screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { expect, it, vi } from 'vitest';
import { LightReport } from '@faintward/contracts/light-report';
import { lightReport, reportWithoutLight, reportWithoutSource } from '../../testing/lightReportExample';
import { renderPart } from '../../testing/renderRoute';
import { placeBands } from './BandSpans';
import { bandState } from './darkness';
import { timeText } from './CosmologiesTable';
import { LightReportView } from './LightReportView';
import { placeLines } from './SpectrumDrawing';

const view = (report = lightReport, compact = false) => {
  const onBandChange = vi.fn();
  renderPart(<LightReportView report={report} onBandChange={onBandChange} compact={compact} />);
  return onBandChange;
};

it('the examples are reports as the contract has them', () => {
  for (const report of [lightReport, reportWithoutLight, reportWithoutSource]) {
    expect(LightReport.safeParse(report).error?.issues ?? []).toEqual([]);
  }
});

it('puts cautions first, the answer next, and where it comes from at the foot', async () => {
  view();
  const texts = document.body.textContent ?? '';
  expect(texts.indexOf('bands blueward of it receive no light')).toBeLessThan(texts.indexOf('25.98 AB'));
  expect(screen.getByText(/25\.91 to 26\.06 in 68 % of\s+the draws/)).toBeVisible();
  expect(texts.indexOf('engine 0.2.0')).toBeGreaterThan(texts.indexOf('Suggestions, not measurements'));
  expect(screen.getByRole('link', { name: /reference data 5c1e77a0b2d4/ })).toHaveAttribute('href', '/sources');
  await userEvent.click(screen.getByRole('button', { name: /49\.2407\s*mag/ }));
  expect(await screen.findByRole('dialog', { name: 'Distance modulus' })).toHaveTextContent('5 log₁₀(D_L / 10 pc)');
});

it('gives every picture a sentence', () => {
  view();
  const names = screen.getAllByRole('img').map((picture) => picture.getAttribute('aria-label'));
  expect(names).toEqual([
    expect.stringMatching(/^Light budget in J: /),
    expect.stringMatching(/brightest in Y, 25\.98 AB; no light in U, B, V/),
    expect.stringMatching(
      /^Distribution of the redshift: 6\.98, between 6\.71 and 7\.24; 88 % near 7\.00, 12 % near 1\.70/,
    ),
    expect.stringMatching(/^Magnitudes drawn in J: 25\.98/),
  ]);
});

it('tells bands with and without light apart in words, and changes the band by either way', async () => {
  const onBandChange = view();
  const spans = within(screen.getByRole('group', { name: 'Bands' }));
  expect(spans.getByRole('button', { name: /^J 25\.98/ })).toHaveAttribute('aria-pressed', 'true');
  await userEvent.click(spans.getByRole('button', { name: /^H 25\.98/ }));
  expect(onBandChange).toHaveBeenLastCalledWith('H');
  const table = within(screen.getByRole('region', { name: 'Table of bands' }));
  expect(
    table.getByRole('row', { name: /^z 825–965 No flux in this band: the Lyman break is at 0\.97 µm/ }),
  ).toBeVisible();
  await userEvent.click(table.getByRole('button', { name: 'Light budget in Ks' }));
  expect(onBandChange).toHaveBeenLastCalledWith('Ks');
});

it('turns flux into magnitudes and zooms into the chosen band', async () => {
  view();
  await userEvent.click(within(screen.getByRole('group', { name: 'Flux axis' })).getByRole('button', { name: 'AB' }));
  expect(screen.getByText('AB magnitude', { selector: 'text' })).toBeInTheDocument();
  await userEvent.click(screen.getByRole('button', { name: 'Around J' }));
  const left = within(screen.getByRole('group', { name: 'Bands' })).getAllByRole('button');
  expect(left.map((button) => button.textContent?.slice(0, 1))).toEqual(['Y', 'J']);
});

it('says why there is no light, and draws no number for it', () => {
  view(reportWithoutLight);
  expect(
    screen.getAllByText(/No flux in this band: the Lyman break is at 0\.97 µm/, { selector: 'p' }).length,
  ).toBeGreaterThan(0);
  expect(screen.getByText(/The ledger stops here/)).toBeVisible();
  expect(screen.queryByText(/25\.98 AB/)).not.toBeInTheDocument();
});

it('without a source, distances, lines and dimming remain', () => {
  view(reportWithoutSource);
  expect(screen.queryByText(/Light budget/)).not.toBeInTheDocument();
  expect(screen.getByRole('region', { name: 'Table of lines' })).toBeVisible();
  expect(screen.getByText(/each photon arrives with less energy/)).toBeVisible();
});

it('is shorter beside a table', () => {
  view(lightReport, true);
  expect(screen.queryByRole('region', { name: 'Table of cosmologies' })).not.toBeInTheDocument();
  expect(screen.getByRole('list', { name: /Light budget in J, step by step/ })).toBeVisible();
});

it('gives time factors with their reason', () => {
  // 10^(0.8 × 0.0458) = 1.088: planck18 asks 1.09 times the time of conv70.
  expect(timeText({ skyLimitedTimeFactor: 1.088, deltaDistanceModulusMag: 0.0458 })).toBe(
    'asks 1.09 times the time: 0.046 mag fainter, because it would be farther',
  );
  expect(timeText({ skyLimitedTimeFactor: 1, deltaDistanceModulusMag: 0.05 })).toBe('asks the same time');
  expect(timeText({ skyLimitedTimeFactor: null, deltaDistanceModulusMag: 0.05 })).toBe('not known without light');
});

it.each([260, 700, 1300])('bands keep apart in their lanes on %i px', (width) => {
  const at = (nm: number) => 62 + ((width - 72) * Math.log(nm / 320)) / Math.log(2400 / 320);
  const placed = placeBands(lightReport.bands, at, 62, width - 10);
  expect(placed).toHaveLength(lightReport.bands.length);
  for (const one of placed) {
    expect(one.from).toBeGreaterThanOrEqual(61.9);
    expect(one.from + one.width).toBeLessThanOrEqual(width - 9.9);
    const touching = placed.filter(
      (other) =>
        other !== one &&
        other.lane === one.lane &&
        other.from < one.from + one.width &&
        one.from < other.from + other.width,
    );
    expect(touching).toEqual([]);
  }
});

it('names two lines of an ion once where they are close, and each where they are not', () => {
  const [first] = lightReport.lines;
  const doublet = [
    { ...first!, lineId: 'a', label: 'Mg II 2796', observedWavelengthNm: 2237 },
    { ...first!, lineId: 'b', label: 'Mg II 2804', observedWavelengthNm: 2243 },
    { ...first!, lineId: 'c', label: 'Hα', observedWavelengthNm: 2246 },
  ];
  const labels = (pixelsPerNm: number) =>
    placeLines(doublet, [2000, 2400], (nm) => (nm - 2000) * pixelsPerNm, 0, 400 * pixelsPerNm)
      .placed.map((label) => label.item.label)
      .toSorted();
  expect(labels(2)).toEqual(['Hα', 'Mg II']);
  expect(labels(20)).toEqual(['Hα', 'Mg II 2796', 'Mg II 2804']);
});

it('does not take a band that the spectrum does not reach for one without light', () => {
  const band = lightReport.bands.find((one) => one.bandId === 'B');
  const unreached = {
    ...band!,
    magnitudeAb: null,
    reason: { code: 'spectrumEnds', message: 'The spectrum says nothing about this range.' },
  };
  expect(bandState(band!)).toBe('dark');
  expect(bandState(unreached)).toBe('unknown');
  view({ ...lightReport, bands: lightReport.bands.map((one) => (one.bandId === 'B' ? unreached : one)) });
  expect(screen.getByRole('button', { name: /^B .*not known/ })).toBeVisible();
  expect(screen.getByRole('img', { name: /nothing known of B/ })).toBeVisible();
});
