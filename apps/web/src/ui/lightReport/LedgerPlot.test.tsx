import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { expect, it } from 'vitest';
import { estimateSteps, ledgerSteps, lightReport } from '../../testing/lightReportExample';
import { renderPart } from '../../testing/renderRoute';
import { LightBudget } from '../LightBudget';
import { LedgerPlot } from './LedgerPlot';

const plot = (props: Partial<Parameters<typeof LedgerPlot>[0]> = {}) =>
  renderPart(<LedgerPlot steps={ledgerSteps} title="Light budget in J" what="Light budget in J" {...props} />);

it('is a picture with a sentence, and a list of steps with signed changes and running totals', () => {
  plot({ aperture: lightReport.ledger!.aperture });
  expect(screen.getByRole('img', { name: /Light budget in J: Absolute magnitude as given, −21\.00/ })).toBeVisible();
  const steps = within(screen.getByRole('list', { name: 'Light budget in J, step by step' })).getAllByRole('button');
  expect(steps.map((step) => step.textContent)).toEqual([
    'Absolute magnitude as given, total −21.00',
    'Distance modulus, +49.24 mag, total 28.24',
    'Stretched bandwidth, −2.26 mag, total 25.98',
    'Spectrum between the given wavelength and the band, 0.00 mag, total 25.98',
    'Intergalactic hydrogen, 0.00 mag, total 25.98',
    'Light outside 0.36″ radius, +0.36 mag, total 26.35',
  ]);
});

it('opens a step where the keyboard is, goes on with the arrows and closes with Escape', async () => {
  plot();
  const first = screen.getByRole('button', { name: /Absolute magnitude as given/ });
  first.focus();
  await userEvent.keyboard('{ArrowDown}');
  const card = await screen.findByRole('tooltip');
  expect(card).toHaveTextContent('5 log10(D_L / 10 pc)');
  expect(card).toHaveTextContent('luminosity distance');
  expect(card).toHaveTextContent('Source: Hogg 1999');
  expect(screen.getByRole('button', { name: /Distance modulus/ })).toHaveAccessibleDescription(/Hogg 1999/);
  await userEvent.keyboard('{Escape}');
  await waitFor(() => expect(screen.queryByRole('tooltip')).not.toBeInTheDocument());
});

it('opens and closes a step by click', async () => {
  plot();
  const step = screen.getByRole('button', { name: /Stretched bandwidth/ });
  await userEvent.click(step);
  expect(await screen.findByRole('tooltip')).toHaveTextContent('−2.5 log10(1 + z)');
  await userEvent.click(step);
  await waitFor(() => expect(screen.queryByRole('tooltip')).not.toBeInTheDocument());
});

it('has the same as a table', async () => {
  plot();
  await userEvent.click(screen.getByRole('button', { name: 'Numbers' }));
  expect(await screen.findByRole('row', { name: /On the way Distance modulus \+49\.241 28\.241/ })).toBeInTheDocument();
});

it('stops in words where there is no light, and draws no aperture then', () => {
  plot({ reason: 'No flux in this band: the Lyman break is at 0.97 µm.', aperture: lightReport.ledger!.aperture });
  expect(screen.getByText(/The ledger stops here\. No flux in this band/)).toBeVisible();
  expect(screen.queryByRole('button', { name: /Light outside/ })).not.toBeInTheDocument();
});

it('goes on to counted electrons, with the rate that the last total stands for', () => {
  renderPart(<LightBudget steps={estimateSteps} />);
  // −1.496 mag: 10^(0.4 · 1.496) = 3.97 electrons per second.
  expect(screen.getByText('3.97 e⁻/s')).toBeVisible();
  expect(screen.getByText('Counting')).toBeInTheDocument();
});
