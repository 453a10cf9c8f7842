import type { CaseSectionId } from '@faintward/contracts/proposals';

export interface CaseSectionRule {
  sectionId: CaseSectionId;
  title: string;
  guidance: string;
  isRequired: boolean;
  wordLimit: number;
}

/** The sections of a case in the order they are read: the one place that knows their limits. */
export const CASE_SECTIONS: readonly CaseSectionRule[] = [
  {
    sectionId: 'science',
    title: 'Scientific case',
    guidance:
      'What question the observations answer, why it matters, and why these targets. Write for astronomers of other fields.',
    isRequired: true,
    wordLimit: 1000,
  },
  {
    sectionId: 'technical',
    title: 'Technical case',
    guidance:
      'Why these modes, goals and conditions; how the data will be reduced; what happens if conditions are worse.',
    isRequired: true,
    wordLimit: 600,
  },
  {
    sectionId: 'background',
    title: 'Background',
    guidance: 'Earlier observations of the same targets, related programmes, and what became of time awarded before.',
    isRequired: false,
    wordLimit: 600,
  },
];

/** Version of a section that nobody has begun; the first text that is saved becomes version 2. */
export const UNWRITTEN_VERSION = 1;

/** Words as a person counts them: runs of anything between blanks that hold a letter or a digit. */
export function countWords(text: string): number {
  return text.split(/\s+/u).filter((word) => /[\p{L}\p{N}]/u.test(word)).length;
}
