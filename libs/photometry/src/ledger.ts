/** The part of the way a step belongs to. */
export type LedgerStage = 'source' | 'space' | 'atmosphere' | 'instrument' | 'counting';

/** A quantity that a step used, with its unit ('' for a pure number). */
export interface LedgerInput {
  name: string;
  value: number;
  unit: string;
}

/** One line of a light budget. */
export interface LedgerStep {
  id: string;
  stage: LedgerStage;
  title: string;
  /** What this step adds, in magnitudes: positive dims. The first step holds the starting magnitude. */
  deltaMag: number;
  /** Sum of all `deltaMag` up to and including this step, added in order. */
  totalMag: number;
  formula: string;
  inputs: LedgerInput[];
  source: string;
}

/** What a step is, wherever it occurs; the numbers are added by whoever computes them. */
export interface StepText {
  stage: LedgerStage;
  title: string;
  formula: string;
  source: string;
}

/** Adds up a light budget. The total is the sum of the steps in order, to the last bit. */
export class Ledger {
  readonly steps: LedgerStep[] = [];
  totalMag = 0;

  add(id: string, text: StepText, deltaMag: number, inputs: LedgerInput[]): void {
    this.totalMag += deltaMag;
    this.steps.push({
      id,
      stage: text.stage,
      title: text.title,
      deltaMag,
      totalMag: this.totalMag,
      formula: text.formula,
      inputs,
      source: text.source,
    });
  }
}

/** A quantity for a step of a ledger; the unit is '' for a pure number. */
export function ledgerInput(name: string, value: number, unit = ''): LedgerInput {
  return { name, value, unit };
}
