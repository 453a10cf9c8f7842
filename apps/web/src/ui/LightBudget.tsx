import type { ReactNode } from 'react';
import type { LedgerStep } from './lightReport/ledger';
import { LedgerPlot } from './lightReport/LedgerPlot';

/** The light budget of an estimate, from the source to the counted electrons. */
export function LightBudget({
  steps,
  title = 'From the source to the detector',
  reason,
  fileName,
}: {
  steps: readonly LedgerStep[];
  title?: ReactNode;
  /** Why the light does not come further, where it does not. */
  reason?: string;
  fileName?: string;
}) {
  return (
    <LedgerPlot
      steps={steps}
      title={title}
      what="Light budget"
      {...(reason ? { reason } : {})}
      {...(fileName ? { fileName } : {})}
    />
  );
}
