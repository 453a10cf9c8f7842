import { BandId, MagnitudeSystem } from '@faintward/contracts/light';
import Box from '@mui/material/Box';
import Stack from '@mui/material/Stack';
import { useDebounced } from '../../lib/useDebounced';
import { Disclosure } from './Disclosure';
import { DraftChoice, DraftField, FieldGrid, FieldGroup, type DraftProps } from './DraftFields';
import { ExtentFields } from './ExtentFields';
import type { LightDraft } from './lightDraft';
import { calibrationOptions, cosmologyOptions, kindOptions, tracerOptions, type Options } from './lightWords';
import { LineFields } from './LineFields';
import { ContainedLine, OnTheWayFields } from './OnTheWayFields';
import { QuantityField, type ReadingProps } from './QuantityField';
import { otherParameters } from './readLightDraft';
import { SpectrumFields } from './SpectrumFields';
import { SuggestionLine, Suggestions } from './Suggestions';

export interface LightFieldsProps extends DraftProps<LightDraft>, ReadingProps {
  /** Of the source, as far as it is known: for typical values and observed wavelengths. */
  redshift: number | undefined;
  /** With it, spectra that were uploaded to the proposal may be chosen. */
  proposalId?: string | undefined;
  /** False where a light is needed: then "nothing yet" is no choice. */
  mayBeUnknown?: boolean;
}

const bandOptions = BandId.options.map((band) => [band, band] as const);
const systemOptions = MagnitudeSystem.options.map((system) => [system, system] as const);

/** What is known of a source's light and size, and what happens to it on the way. Draws; its owner keeps the draft. */
export function LightFields({ redshift: typedRedshift, proposalId, mayBeUnknown = true, ...props }: LightFieldsProps) {
  // While it is typed, typical values and observed wavelengths are not asked for at every key.
  const redshift = useDebounced(typedRedshift, 500);
  const { draft } = props;
  const isLine = draft.light === 'lineFlux' || draft.light === 'lineLuminosity';
  return (
    <Stack sx={{ gap: 2.5 }}>
      <FieldGroup title="Light">
        <FieldGrid>
          <DraftChoice
            {...props}
            wide
            name="light"
            label="What is known of its light"
            options={kindOptions.filter(([kind]) => mayBeUnknown || kind !== 'none')}
          />
          <Value {...props} redshift={redshift} />
        </FieldGrid>
      </FieldGroup>
      {draft.light !== 'none' && !isLine && <SpectrumFields {...props} proposalId={proposalId} />}
      {draft.light !== 'none' && (
        <Box>
          <Box sx={{ mb: 1 }}>
            <ContainedLine draft={draft} />
          </Box>
          <OnTheWayFields {...props} />
        </Box>
      )}
      <ExtentFields {...props} redshift={redshift} />
      <Suggestions
        redshift={redshift}
        relation={draft.relation}
        draft={draft}
        disabled={props.disabled}
        onChange={props.onChange}
      />
    </Stack>
  );
}

/** The quantity of the kind chosen, and what belongs to it. */
function Value({ redshift, ...props }: DraftProps<LightDraft> & ReadingProps & { redshift: number | undefined }) {
  const { draft } = props;
  const sigma = <DraftField {...props} name="sigma" label="Uncertainty, 1 σ" unit="mag" hint="may be empty" />;
  switch (draft.light) {
    case 'none':
      return <QuantityField {...props} />;
    case 'apparentMagnitude':
      return (
        <>
          <QuantityField {...props} />
          <DraftChoice {...props} name="band" label="Band" options={bandOptions} />
          <DraftChoice {...props} name="system" label="System" options={systemOptions} />
          {sigma}
        </>
      );
    case 'absoluteMagnitude':
      return (
        <>
          <QuantityField {...props} />
          <DraftChoice
            {...props}
            name="restBand"
            label="In the rest frame at"
            options={[['', 'a wavelength'], ...bandOptions.map(([band]) => [band, `band ${band}`] as const)]}
          />
          {draft.restBand === '' && <DraftField {...props} name="rest" label="Rest wavelength" unit="nm" />}
          <DraftChoice {...props} name="absoluteSystem" label="System" options={systemOptions} />
          {sigma}
          <DerivedWith {...props} />
        </>
      );
    case 'lineFlux':
    case 'lineLuminosity':
      return (
        <>
          <QuantityField {...props} />
          <LineFields {...props} redshift={redshift} />
          {sigma}
          {draft.light === 'lineLuminosity' && <DerivedWith {...props} />}
        </>
      );
    case 'starFormationRate':
      return (
        <>
          <QuantityField {...props} />
          <DraftChoice {...props} name="calibration" label="Relation" options={calibrationOptions} />
          <DraftChoice {...props} name="tracer" label="Seen in" options={tracerOptions} />
          {draft.tracer === 'lymanAlpha' && (
            <DraftField
              {...props}
              name="escape"
              label="Escape of Lyα"
              hint="needed: there is no safe value; 0.05 to 0.3 is common"
            />
          )}
          {draft.tracer !== 'ultraviolet' && <DraftField {...props} name="width" label="Velocity width" unit="km/s" />}
          {sigma}
          <DerivedWith {...props} />
        </>
      );
    case 'typical':
      return (
        <>
          <DraftChoice
            {...props}
            onChange={(change) => props.onChange({ ...change, ...spectrumFor(change.typicalOf, draft.spectrum) })}
            wide
            name="typicalOf"
            label="Its kind"
            options={[
              ['starFormingGalaxy', 'star-forming galaxy, at the knee of the luminosity function'],
              ['supernovaIa', 'type Ia supernova at maximum'],
            ]}
          />
          <SuggestionLine
            redshift={redshift}
            find={({ light }) => light?.kind === 'typical' && light.of === draft.typicalOf}
          />
          {sigma}
        </>
      );
  }
}

/** A supernova's spectrum is no galaxy's: the choice beneath follows, as far as it was of the other kind. */
function spectrumFor(kind: LightDraft['typicalOf'] | undefined, spectrum: LightDraft['spectrum']): Partial<LightDraft> {
  if (kind === 'supernovaIa') return { spectrum: 'supernovaIa' };
  return spectrum === 'supernovaIa' ? { spectrum: 'powerLaw' } : {};
}

const derivedOptions: Options = [['inUse', 'the one in use here'], ...cosmologyOptions, ['own', 'another: H₀ and Ω_m']];

/** A luminosity from the literature holds for the cosmology that it was derived with. */
function DerivedWith(props: DraftProps<LightDraft>) {
  const { draft, errors } = props;
  const more = Object.entries(otherParameters(draft));
  return (
    <Box sx={{ gridColumn: '1 / -1' }}>
      <Disclosure
        title="Derived with the cosmology"
        summary={derivedOptions.find(([choice]) => choice === draft.derivedWith)?.[1]}
        mustOpen={[errors.derivedWith, errors.derivedH0, errors.derivedOm].some(Boolean)}
      >
        <FieldGrid>
          <DraftChoice
            {...props}
            wide
            name="derivedWith"
            label="Cosmology of its publication"
            hint="The value is carried over to the cosmology in use."
            options={derivedOptions}
          />
          {draft.derivedWith === 'own' && (
            <>
              <DraftField {...props} name="derivedH0" label="H₀" unit="km/s/Mpc" />
              <DraftField
                {...props}
                name="derivedOm"
                label="Ω_m"
                hint={
                  more.length > 0
                    ? more.map(([name, value]) => `${name} ${String(value)}`).join(', ')
                    : 'the rest is flat Λ'
                }
              />
            </>
          )}
        </FieldGrid>
      </Disclosure>
    </Box>
  );
}
