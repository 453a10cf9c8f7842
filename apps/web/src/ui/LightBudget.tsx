import type { LedgerStep } from './lightReport/ledger';
import { LedgerPlot } from './lightReport/LedgerPlot';

/** The light budget of an estimate, from the source to the counted electrons. */
export function LightBudget({ steps }: { steps: readonly LedgerStep[] }) {
  return <LedgerPlot steps={steps} title="From the source to the detector" what="Light budget" />;
}
