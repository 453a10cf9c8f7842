import Button from '@mui/material/Button';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { formatNumber } from '../../lib/format';
import { DraftChoice, DraftField, FieldGrid, FieldGroup, type DraftProps } from './DraftFields';
import { Disclosure } from './Disclosure';
import type { LightDraft } from './lightDraft';
import { lightQueries } from './lightQueries';
import { spectrumOptions } from './lightWords';
import { SpectraDialog } from './SpectraDialog';

export interface SpectrumFieldsProps extends DraftProps<LightDraft> {
  /** Without one there are no spectra of ours to choose from. */
  proposalId?: string | undefined;
}

/** The shape of the spectrum in the source's rest frame, with its few parameters. */
export function SpectrumFields(props: SpectrumFieldsProps) {
  const { draft, proposalId } = props;
  const options = spectrumOptions.filter(
    ([kind]) => kind !== 'uploaded' || proposalId !== undefined || draft.spectrum === 'uploaded',
  );
  return (
    <FieldGroup title="Spectrum">
      <FieldGrid>
        <DraftChoice {...props} wide name="spectrum" label="Its spectrum is that of" options={options} />
        <Parameters {...props} />
      </FieldGrid>
    </FieldGroup>
  );
}

function Parameters(props: SpectrumFieldsProps) {
  const { draft } = props;
  switch (draft.spectrum) {
    case 'powerLaw':
      return (
        <>
          <DraftField {...props} name="slope" label="Slope β" hint="f_λ ∝ λ^β; −2 is flat in AB" />
          <DraftField {...props} name="lymanEscape" label="Escape below 91.2 nm" hint="0 to 1" />
        </>
      );
    case 'starForming':
      return <StarForming {...props} />;
    case 'passive':
      return null;
    case 'quasar':
      return (
        <DraftChoice
          {...props}
          wide
          name="template"
          label="Template"
          options={[
            ['powerLaws', 'two power laws with lines'],
            ['hewettWild2010', 'composite, Hewett & Wild 2010'],
          ]}
        />
      );
    case 'supernovaIa':
      return <DraftField {...props} name="phase" label="Phase" unit="d" hint="rest frame, from maximum in B" />;
    case 'blackbody':
      return <DraftField {...props} name="temperature" label="Temperature" unit="K" />;
    case 'uploaded':
      return <Uploaded {...props} />;
  }
}

const lineNames = ['lymanAlpha', 'oxygenII', 'oxygenIII', 'hydrogenAlpha'] as const;

function StarForming(props: SpectrumFieldsProps) {
  const { draft, errors } = props;
  const drawn = lineNames.filter((name) => draft[name].trim() !== '' && draft[name] !== '0').length;
  return (
    <>
      <DraftField {...props} name="slope" label="Ultraviolet slope β" hint="f_λ ∝ λ^β" />
      <DraftField {...props} name="breakRatio" label="Break ratio" hint="1 none, 1.1 young, 2 old" />
      <div style={{ gridColumn: '1 / -1' }}>
        <Disclosure
          title="Lines in it"
          summary={drawn === 0 ? 'none' : `${drawn} of ${lineNames.length}`}
          mustOpen={lineNames.some((name) => errors[name] !== undefined)}
        >
          <FieldGrid>
            <DraftField {...props} name="lymanAlpha" label="Lyα" unit="nm" hint="rest equivalent width" />
            <DraftField {...props} name="oxygenII" label="[O II]" unit="nm" hint="rest equivalent width" />
            <DraftField {...props} name="oxygenIII" label="[O III] + Hβ" unit="nm" hint="rest equivalent width" />
            <DraftField {...props} name="hydrogenAlpha" label="Hα" unit="nm" hint="rest equivalent width" />
          </FieldGrid>
        </Disclosure>
      </div>
    </>
  );
}

function Uploaded(props: SpectrumFieldsProps) {
  const { draft, onChange, proposalId } = props;
  const [isOpen, setIsOpen] = useState(false);
  const spectra = useQuery({ ...lightQueries.spectra(proposalId ?? ''), enabled: proposalId !== undefined });
  if (proposalId === undefined) return <span>A spectrum that belongs to a proposal cannot be used here.</span>;
  const rows = spectra.data?.rows ?? [];
  const options = rows.map(
    (row) =>
      [row.spectrumId, `${row.name} (${formatNumber(row.restLowNm)} to ${formatNumber(row.restHighNm)} nm)`] as const,
  );
  const isKnown = rows.some((row) => row.spectrumId === draft.spectrumId);
  const chosen = isKnown || draft.spectrumId === '' ? [] : [[draft.spectrumId, 'the one chosen'] as const];
  return (
    <>
      <DraftChoice
        {...props}
        wide
        name="spectrumId"
        label="Spectrum"
        hint={
          spectra.error
            ? 'The spectra of this proposal could not be loaded.'
            : !spectra.data
              ? 'Loading the spectra of this proposal…'
              : rows.length === 0
                ? 'This proposal has none yet.'
                : undefined
        }
        options={[['', 'choose one'], ...chosen, ...options]}
      />
      <Button
        onClick={() => setIsOpen(true)}
        disabled={props.disabled ?? false}
        sx={{ gridColumn: '1 / -1', justifySelf: 'start' }}
      >
        Upload and manage spectra
      </Button>
      <SpectraDialog
        proposalId={proposalId}
        open={isOpen}
        canEdit={!props.disabled}
        onClose={() => setIsOpen(false)}
        onUse={(spectrumId) => {
          onChange({ spectrumId });
          setIsOpen(false);
        }}
      />
    </>
  );
}
