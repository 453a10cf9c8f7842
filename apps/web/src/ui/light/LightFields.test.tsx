import { Light } from '@faintward/contracts/light';
import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { describe, expect, it } from 'vitest';
import { id } from '../../testing/examples';
import { aLightReport, aLine, aSpectrum, aSuggestion } from '../../testing/lightExamples';
import { renderPart } from '../../testing/renderRoute';
import { answerWith, problem } from '../../testing/server';
import { emptyLightDraft, type LightDraft } from './lightDraft';
import { LightFields } from './LightFields';
import { readLightDraft } from './readLightDraft';

function Holder({ first, proposalId }: { first: Partial<LightDraft>; proposalId?: string }) {
  const [draft, setDraft] = useState({ ...emptyLightDraft, ...first });
  const read = readLightDraft(draft);
  return (
    <>
      <LightFields
        draft={draft}
        errors={read.ok ? {} : read.errors}
        redshift={7.12}
        proposalId={proposalId}
        onChange={(change) => setDraft((old) => ({ ...old, ...change }))}
      />
      <output>{JSON.stringify(read.ok ? read.light : null)}</output>
    </>
  );
}

const light = () =>
  JSON.parse(document.querySelector('output')?.textContent ?? 'null') as Record<string, unknown> | null;
const quantity = (name: string) => screen.getByRole('textbox', { name });

describe('the quantity that says how bright a source is', () => {
  it('takes a bare number in its own unit without asking anybody', async () => {
    const { seen } = answerWith({});
    renderPart(<Holder first={{ light: 'apparentMagnitude' }} />);
    await userEvent.type(quantity('Magnitude'), '22.5{Tab}');
    expect(light()).toMatchObject({ kind: 'apparentMagnitude', magnitude: 22.5 });
    expect(seen).toHaveLength(0);
  });

  it('has a text with a unit read, follows its kind, and says how it was understood', async () => {
    const { seen } = answerWith({
      'POST /light/reading': {
        body: {
          kind: 'lineFlux',
          value: 2e-17,
          unit: 'erg/s/cm²',
          system: null,
          meaning: '2 × 10⁻¹⁷ erg/s/cm² in a line',
        },
      },
      'POST /light': problem(503, 'unavailable'),
    });
    renderPart(<Holder first={{ light: 'apparentMagnitude', magnitude: '24', band: 'J' }} />);
    const field = quantity('Magnitude');
    await userEvent.clear(field);
    await userEvent.type(field, '2e-17 erg/s/cm^2{Enter}');
    expect(await screen.findByText('“2e-17 erg/s/cm^2” read as 2 × 10⁻¹⁷ erg/s/cm² in a line')).toBeVisible();
    expect(seen[0]?.body).toEqual({ text: '2e-17 erg/s/cm^2', bandId: 'J', system: 'AB' });
    expect(screen.getByRole('combobox', { name: 'What is known of its light' })).toHaveTextContent('flux of a line');
    expect(quantity('Line flux')).toHaveValue('2e-17');
    expect(light()).toMatchObject({ kind: 'lineFlux', fluxErgSCm2: 2e-17 });
  });

  it('keeps what is refused, says why under it, and does not ask the same again', async () => {
    const { seen } = answerWith({
      'POST /light/reading': problem(400, 'validation-failed', {
        fieldErrors: [{ path: 'text', message: '“parsnips” is no unit of light.' }],
      }),
    });
    renderPart(<Holder first={{}} />);
    const field = quantity('How bright, with its unit');
    await userEvent.type(field, '12 parsnips{Tab}');
    expect(await screen.findByText('“parsnips” is no unit of light.')).toBeVisible();
    expect(field).toHaveValue('12 parsnips');
    expect(field).toBeInvalid();
    await userEvent.click(field);
    await userEvent.tab();
    expect(seen).toHaveLength(1);
    expect(light()).toBeNull();
  });

  it('keeps what could not be sent and sends it on Enter', async () => {
    const { handlers, seen } = answerWith({});
    renderPart(<Holder first={{ light: 'apparentMagnitude' }} />);
    const field = quantity('Magnitude');
    await userEvent.type(field, '12 uJy{Enter}');
    expect(await screen.findByText(/Not read: .* Press Enter to try again\./)).toBeVisible();
    expect(field).toHaveValue('12 uJy');
    handlers['POST /light/reading'] = {
      body: { kind: 'apparentMagnitude', value: 21.2021, unit: 'mag', system: 'AB', meaning: '21.20 mag AB in V' },
    };
    await userEvent.type(field, '{Enter}');
    expect(await screen.findByText('“12 uJy” read as 21.20 mag AB in V')).toBeVisible();
    expect(light()).toMatchObject({ magnitude: 21.2021 });
    expect(seen).toHaveLength(2);
  });

  it('does not let a late reading overwrite what was typed meanwhile', async () => {
    let answer: (() => void) | undefined;
    answerWith({
      'POST /light/reading': () =>
        new Promise((resolve) => {
          answer = () =>
            resolve({
              body: { kind: 'apparentMagnitude', value: 21.2, unit: 'mag', system: 'AB', meaning: '21.20 mag AB' },
            });
        }),
    });
    renderPart(<Holder first={{ light: 'apparentMagnitude' }} />);
    const field = quantity('Magnitude');
    await userEvent.type(field, '12 uJy{Enter}');
    await waitFor(() => expect(answer).toBeDefined());
    await userEvent.clear(field);
    await userEvent.type(field, '23');
    answer?.();
    await new Promise((resolve) => setTimeout(resolve, 50));
    expect(field).toHaveValue('23');
  });
});

describe('the form that describes light', () => {
  it('says what the value contains, and what follows from saying otherwise', async () => {
    answerWith({});
    renderPart(<Holder first={{ light: 'absoluteMagnitude', absolute: '−21', galacticDust: '0.03' }} />);
    expect(
      screen.getByText(
        'The value contains the dust in its host. Of the dust of the Galaxy and the magnification, what is given comes on top.',
      ),
    ).toBeVisible();
    await userEvent.click(screen.getByRole('button', { name: /On the way/ }));
    expect(screen.getByText('E(B−V) 0.03 dims and reddens the value on its way.')).toBeVisible();
    await userEvent.click(screen.getByRole('checkbox', { name: /the dust of the Galaxy/ }));
    expect(screen.getByText('E(B−V) 0.03 is in the value and does not dim it again.')).toBeVisible();
    expect(light()).toMatchObject({ includes: { hostDust: true, galacticDust: true, lensing: false } });
  });

  it('opens what holds a fault', () => {
    answerWith({});
    renderPart(<Holder first={{ light: 'apparentMagnitude', magnitude: '24', magnification: '−1' }} />);
    expect(screen.getByText('A magnification is above 0.')).toBeVisible();
  });

  it('offers the lines that the server names', async () => {
    answerWith({
      'POST /light': {
        body: aLightReport({
          lines: [
            aLine(),
            aLine({ lineId: 'hydrogenAlpha', label: 'Hα', restWavelengthNm: 656.46, observedWavelengthNm: 5330.5 }),
          ],
        }),
      },
    });
    renderPart(<Holder first={{ light: 'lineFlux', flux: '2e-17' }} />);
    const line = await screen.findByRole('combobox', { name: 'Line' });
    expect(screen.getByText('Loading the lines…')).toBeVisible();
    await waitFor(() => expect(line).toHaveTextContent('Lyα, 121.567 nm'));
    expect(screen.getByText('observed at 987.12 nm')).toBeVisible();
    await userEvent.click(line);
    await userEvent.click(await screen.findByRole('option', { name: 'Hα, 656.460 nm' }));
    expect(light()).toMatchObject({ restWavelengthNm: 656.46 });
  });

  it('takes a wavelength where the lines could not be loaded, and says that they could not', async () => {
    answerWith({ 'POST /light': problem(422, 'refused') });
    renderPart(<Holder first={{ light: 'lineFlux', flux: '2e-17' }} />);
    expect(await screen.findByText('The lines could not be loaded: give the wavelength.')).toBeVisible();
    expect(screen.getByRole('combobox', { name: 'Line' })).toHaveAttribute('aria-disabled', 'true');
    const field = quantity('Rest wavelength');
    await userEvent.clear(field);
    await userEvent.type(field, '500.824');
    expect(light()).toMatchObject({ restWavelengthNm: 500.824 });
  });

  it('fills in a suggestion only when asked, says that it is one, and puts back what stood there', async () => {
    answerWith({
      'GET /light/suggestions': {
        body: {
          rows: [aSuggestion(), aSuggestion({ id: 'far', title: 'Further out', isExtrapolated: true, light: null })],
        },
      },
    });
    renderPart(<Holder first={{ light: 'apparentMagnitude', magnitude: '24' }} />);
    await userEvent.click(screen.getByRole('button', { name: /Typical values/ }));
    const list = await screen.findByRole('list', { name: 'Typical at redshift 7.120' });
    expect(within(list).getByText(/outside its range: z 2 to 9/)).toBeVisible();
    expect(within(list).queryByRole('button', { name: 'Use Further out' })).not.toBeInTheDocument();
    expect(light()).toMatchObject({ magnitude: 24 });
    await userEvent.click(within(list).getByRole('button', { name: 'Use Knee of the luminosity function' }));
    expect(light()).toMatchObject({ kind: 'absoluteMagnitude', magnitude: -20.9, restWavelengthNm: 160 });
    expect(screen.getByText(/Filled in from a suggestion, not a measurement/)).toBeVisible();
    await userEvent.click(screen.getByRole('button', { name: 'Put back what stood there' }));
    expect(light()).toMatchObject({ kind: 'apparentMagnitude', magnitude: 24 });
  });

  it('labels a typical brightness as a suggestion with its source', async () => {
    answerWith({
      'GET /light/suggestions': {
        body: {
          rows: [
            aSuggestion({
              valueText: 'M = −19.3 in B',
              light: Light.parse({ kind: 'typical', of: 'supernovaIa' }),
            }),
          ],
        },
      },
    });
    renderPart(<Holder first={{ light: 'typical', typicalOf: 'supernovaIa' }} />);
    expect(
      await screen.findByText('A suggestion, not a measurement: M = −19.3 in B. An invented survey.'),
    ).toBeVisible();
  });

  it('gives a supernova that is only known by its kind the spectrum of one', async () => {
    answerWith({ 'GET /light/suggestions': { body: { rows: [] } } });
    renderPart(<Holder first={{ light: 'typical' }} />);
    await userEvent.click(screen.getByRole('combobox', { name: 'Its kind' }));
    await userEvent.click(await screen.findByRole('option', { name: /supernova/ }));
    expect(light()).toMatchObject({ of: 'supernovaIa', spectrum: { kind: 'supernovaIa' } });
  });
});

describe('spectra of ours', () => {
  it('are chosen, uploaded, and not removed while a target uses them', async () => {
    const proposalId = id(50);
    const rows = [aSpectrum(), aSpectrum({ spectrumId: id(91), name: 'Used one', usedByCount: 2 })];
    const { handlers, seen } = answerWith({
      [`GET /proposals/${proposalId}/spectra`]: () => ({ body: { rows } }),
      [`POST /proposals/${proposalId}/spectra`]: problem(400, 'validation-failed', {
        fieldErrors: [{ path: 'text', message: 'Line 2 has one column only.' }],
      }),
    });
    renderPart(
      <Holder first={{ light: 'apparentMagnitude', magnitude: '24', spectrum: 'uploaded' }} proposalId={proposalId} />,
    );
    await userEvent.click(screen.getByRole('button', { name: 'Upload and manage spectra' }));
    const dialog = await screen.findByRole('dialog', { name: 'Spectra of this proposal' });
    expect(await within(dialog).findByText(/Used by 2 targets/)).toBeVisible();
    expect(within(dialog).getAllByRole('button', { name: 'Remove' })[1]).toBeDisabled();

    await userEvent.click(within(dialog).getByRole('button', { name: 'Add the spectrum' }));
    expect(within(dialog).getByText('Paste a table, or choose a file.')).toBeVisible();
    await userEvent.upload(
      within(dialog).getByLabelText('File for: Table'),
      new File(['100 1\n101'], 'stack.txt', { type: 'text/plain' }),
    );
    await waitFor(() => expect(within(dialog).getByRole('textbox', { name: 'Name' })).toHaveValue('stack'));
    await userEvent.click(within(dialog).getByRole('button', { name: 'Add the spectrum' }));
    expect(await within(dialog).findByText('Line 2 has one column only.')).toBeVisible();
    expect(within(dialog).getByRole('textbox', { name: 'Table' })).toHaveValue('100 1\n101');
    expect(seen.at(-1)?.body).toMatchObject({ name: 'stack', wavelengthUnit: null, fluxKind: 'perWavelength' });

    handlers[`POST /proposals/${proposalId}/spectra`] = {
      status: 201,
      body: aSpectrum({ spectrumId: id(92), name: 'stack' }),
    };
    await userEvent.click(within(dialog).getByRole('button', { name: 'Add the spectrum' }));
    expect(await screen.findByText('stack added.')).toBeVisible();

    await userEvent.click(within(dialog).getAllByRole('button', { name: 'Use' })[0]!);
    await waitFor(() => expect(light()).toMatchObject({ spectrum: { kind: 'uploaded', spectrumId: id(90) } }));
  }, 60_000);
});
