import { DraftChoice, DraftField, FieldGrid, FieldGroup, type DraftProps } from '../light/DraftFields';
import type { ReactNode } from 'react';
import { perWords } from './estimateWords';
import type { GoalDraft } from './goalDraft';

/** What is asked of an exposure. */
export function GoalFields<Draft extends GoalDraft>({
  isImaging,
  more,
  ...props
}: DraftProps<Draft> & {
  /** Images have no resolution elements. */
  isImaging: boolean;
  /** Further fields of the same group. */
  more?: ReactNode;
}) {
  const { goal, per } = props.draft;
  const pers = Object.entries(perWords).filter(
    ([id]) => id !== 'resolutionElement' || !isImaging || per === 'resolutionElement',
  );
  return (
    <FieldGroup title="Goal">
      <FieldGrid columns={140}>
        <DraftChoice
          {...props}
          wide
          name="goal"
          label="What is asked"
          options={[
            ['signalToNoise', 'time for a signal-to-noise ratio'],
            ['lineSignificance', 'time for a line at n sigma'],
            ['exposureTime', 'signal-to-noise ratio in given exposures'],
          ]}
        />
        {goal === 'signalToNoise' && <DraftField {...props} name="snr" label="S/N" />}
        {goal === 'lineSignificance' && <DraftField {...props} name="snr" label="Significance" unit="σ" />}
        {goal !== 'lineSignificance' && <DraftChoice {...props} name="per" label="per" options={pers} />}
        <DraftField
          {...props}
          name="single"
          label="One exposure"
          unit="s"
          hint={goal === 'exposureTime' ? undefined : 'empty: within its bounds'}
        />
        {goal === 'exposureTime' && <DraftField {...props} name="count" label="Exposures" />}
        {more}
      </FieldGrid>
    </FieldGroup>
  );
}

/** The sky under which an exposure is planned. */
export function ConditionsFields<Draft extends GoalDraft>(props: DraftProps<Draft>) {
  return (
    <FieldGroup title="Conditions">
      <FieldGrid columns={140}>
        <DraftField {...props} name="seeing" label="Seeing" unit="″" hint="zenith, 500 nm" />
        <DraftField {...props} name="airmass" label="Airmass" />
        <DraftChoice
          {...props}
          name="moon"
          label="Moon class"
          options={[
            ['dark', 'dark'],
            ['grey', 'grey'],
            ['bright', 'bright'],
          ]}
        />
        <DraftChoice
          {...props}
          name="transparency"
          label="Transparency"
          options={[
            ['clear', 'clear'],
            ['thinCloud', 'thin cloud'],
          ]}
        />
      </FieldGrid>
    </FieldGroup>
  );
}
