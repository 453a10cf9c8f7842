import type { Notice } from '@faintward/contracts/common';

const weight = { error: 2, warning: 1, note: 0 } as const;

/** The most severe first; among equals in the order of the server. */
export function bySeverity(notices: readonly Notice[]): Notice[] {
  return notices.toSorted((a, b) => weight[b.severity] - weight[a.severity]);
}
