/** Label of a proposal, of its semester's prefix and its running number there: "27B-014". */
export function proposalLabel(semesterPrefix: string, number: number): string {
  return `${semesterPrefix}-${String(number).padStart(3, '0')}`;
}
