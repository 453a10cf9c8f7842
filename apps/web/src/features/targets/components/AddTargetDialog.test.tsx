import { screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { expect, it, vi } from 'vitest';
import { id } from '../../../testing/examples';
import { aTarget } from '../../../testing/proposalExamples';
import { renderPart } from '../../../testing/renderRoute';
import { answerWith, problem } from '../../../testing/server';
import { AddTargetDialog } from './AddTargetDialog';

const base = `/proposals/${id(50)}`;
const common = {
  [`GET ${base}/spectra`]: { body: { rows: [] } },
  'GET /light/suggestions': problem(503, 'unavailable'),
  'POST /light': problem(503, 'unavailable'),
};

/** Types a whole target; the brightness last, with its unit, so that it is unread when "Add" is pressed. */
async function typeAndAdd(brightness: string) {
  const user = userEvent.setup();
  const onAdded = vi.fn();
  renderPart(<AddTargetDialog proposalId={id(50)} open onClose={() => undefined} onAdded={onAdded} />);
  for (const [name, text] of [
    ['Name', 'CLR J0215−0409'],
    ['Right ascension', '02 15 30.77'],
    ['Declination', '−04 09 13.8'],
    ['Redshift', '7.12'],
    ['How bright, with its unit', brightness],
  ] as const) {
    await user.click(screen.getByRole('textbox', { name }));
    await user.paste(text);
  }
  await user.click(screen.getByRole('button', { name: 'Add the target' }));
  return { onAdded };
}

it('waits for a quantity with a unit to be read, then adds, with one click', async () => {
  let answer: (value: { body: unknown }) => void = () => undefined;
  const { seen } = answerWith({
    ...common,
    'POST /light/reading': () =>
      new Promise((resolve) => {
        answer = resolve;
      }),
    [`POST ${base}/targets`]: { status: 201, body: aTarget() },
  });
  const { onAdded } = await typeAndAdd('25.1 mag');
  const added = () => seen.filter((request) => request.path === `${base}/targets`);
  expect(added()).toHaveLength(0);
  answer({ body: { kind: 'apparentMagnitude', value: 25.1, unit: 'mag', system: 'AB', meaning: '25.1 mag (AB)' } });
  await waitFor(() => expect(onAdded).toHaveBeenCalledOnce());
  expect(added()).toHaveLength(1);
  expect(added()[0]?.body).toMatchObject({ light: { kind: 'apparentMagnitude', magnitude: 25.1, system: 'AB' } });
}, 60_000);

it('says why a quantity cannot be read, goes there, and adds nothing', async () => {
  const { seen } = answerWith({
    ...common,
    'POST /light/reading': problem(422, 'validation-failed', {
      fieldErrors: [{ path: 'text', message: '“parsnips” is no unit of light.' }],
    }),
  });
  const { onAdded } = await typeAndAdd('7 parsnips');
  expect(await screen.findByText('“parsnips” is no unit of light.')).toBeVisible();
  await waitFor(() => expect(screen.getByRole('textbox', { name: 'How bright, with its unit' })).toHaveFocus());
  expect(seen.some((request) => request.path === `${base}/targets`)).toBe(false);
  expect(onAdded).not.toHaveBeenCalled();
}, 60_000);
