import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { Disclosure } from './Disclosure';
import { DraftChoice, DraftField, DraftTick, FieldGrid, FieldGroup, type DraftProps } from './DraftFields';
import { containedFields, contains, type Contained, type LightDraft, type LightField } from './lightDraft';
import { dustLawOptions, intergalacticOptions } from './lightWords';

const fields: readonly LightField[] = [
  'hostDust',
  'hostLaw',
  'hostRatio',
  'galacticDust',
  'galacticScale',
  'galacticLaw',
  'magnification',
  'lensSigma',
  'intergalactic',
  'withHostDust',
  'withGalacticDust',
  'withLensing',
];

/** What happens to the light between the source and the atmosphere, and what of it the value already contains. */
export function OnTheWayFields(props: DraftProps<LightDraft>) {
  const { draft, errors, disabled, onChange } = props;
  return (
    <Disclosure
      title="On the way"
      summary={summary(draft)}
      mustOpen={fields.some((field) => errors[field] !== undefined)}
    >
      <Stack sx={{ gap: 2.5 }}>
        <FieldGroup title="Dust in its host">
          <FieldGrid>
            <DraftField {...props} name="hostDust" label="E(B−V)" unit="mag" hint="empty: none" />
            <DraftChoice {...props} name="hostLaw" label="Law" options={dustLawOptions} />
            <DraftField {...props} name="hostRatio" label="R_V" hint="empty: that of the law" />
          </FieldGrid>
        </FieldGroup>
        <FieldGroup title="Galactic dust">
          <FieldGrid>
            <DraftField {...props} name="galacticDust" label="E(B−V)" unit="mag" hint="empty: none" />
            <DraftChoice
              {...props}
              name="galacticScale"
              label="Read off"
              hint={draft.galacticScale === 'sfd' ? 'rescaled: the map is 14 % high' : 'taken as it is'}
              options={[
                ['sfd', 'the SFD map'],
                ['true', 'nothing: a true value'],
              ]}
            />
            <DraftChoice
              {...props}
              name="galacticLaw"
              label="Law"
              options={dustLawOptions.filter(([law]) => law !== 'calzetti2000')}
            />
          </FieldGrid>
        </FieldGroup>
        <FieldGroup title="Lensing and the intergalactic medium">
          <FieldGrid>
            <DraftField {...props} name="magnification" label="Magnification μ" hint="empty: none" />
            <DraftField {...props} name="lensSigma" label="σ of ln μ" hint="0.15 is about ± 15 % of μ" />
            <DraftChoice
              {...props}
              wide
              name="intergalactic"
              label="Intergalactic medium"
              options={intergalacticOptions}
            />
          </FieldGrid>
        </FieldGroup>
        <FieldGroup
          title="The value already contains"
          note="What is ticked is in the value. What is not ticked is applied on top of it."
        >
          <Stack sx={{ gap: 1.25 }}>
            {(Object.keys(containedFields) as Contained[]).map((what) => (
              <DraftTick
                key={what}
                label={containedWords[what]}
                checked={contains(draft, what)}
                consequence={consequenceOf(draft, what)}
                disabled={disabled}
                onChange={(checked) => onChange({ [containedFields[what]]: checked ? 'yes' : 'no' })}
              />
            ))}
          </Stack>
        </FieldGroup>
      </Stack>
    </Disclosure>
  );
}

const containedWords: Record<Contained, string> = {
  hostDust: 'the dust in its host',
  galacticDust: 'the dust of the Galaxy',
  lensing: 'the magnification',
};

/** What a tick, or its absence, does to this value. */
function consequenceOf(draft: LightDraft, what: Contained): string {
  const isIn = contains(draft, what);
  if (what === 'lensing') {
    const factor = draft.magnification.trim();
    if (factor === '' || factor === '1')
      return isIn
        ? 'No magnification is given: the value is as it arrives.'
        : 'No magnification is given: nothing changes.';
    return isIn
      ? `The value is as magnified; without the lens its flux would be divided by ${factor}.`
      : `The value is without the lens; its flux is multiplied by ${factor} on the way.`;
  }
  const excess = draft[what].trim();
  const where = what === 'hostDust' ? 'in its host' : 'of the Galaxy';
  if (excess === '') {
    return isIn ? 'The value is as dimmed and reddened by it.' : `No dust ${where} is given: nothing is taken off.`;
  }
  return isIn
    ? `E(B−V) ${excess} is in the value and does not dim it again.`
    : `E(B−V) ${excess} dims and reddens the value on its way.`;
}

function summary(draft: LightDraft): string {
  const parts = [
    draft.hostDust.trim() && `host E(B−V) ${draft.hostDust}`,
    draft.galacticDust.trim() && `Galactic E(B−V) ${draft.galacticDust}`,
    draft.magnification.trim() && draft.magnification !== '1' && `μ ${draft.magnification}`,
    draft.intergalactic === 'none' && 'no intergalactic absorption',
  ].filter(Boolean);
  return parts.length > 0 ? parts.join(' · ') : 'no dust, no lens';
}

/** The one line that stands under a form of a kind whose value contains other things than one may think. */
export function ContainedLine({ draft }: { draft: LightDraft }) {
  if (draft.light === 'none') return null;
  const whats = Object.keys(containedFields) as Contained[];
  const inIt = whats.filter((what) => contains(draft, what)).map((what) => containedWords[what]);
  const onTop = whats.filter((what) => !contains(draft, what)).map((what) => containedWords[what]);
  return (
    <Typography variant="body2" color="textSecondary">
      The value contains {inIt.length > 0 ? listed(inIt) : 'nothing of what happens on the way'}.
      {onTop.length > 0 && ` Of ${listed(onTop)}, what is given comes on top.`}
    </Typography>
  );
}

function listed(words: readonly string[]): string {
  return words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`;
}
