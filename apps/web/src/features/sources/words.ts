import type { ReferenceDataList } from '@faintward/contracts/light-report';

/** Where a number comes from, in a sentence each. */
export const provenanceLong: Record<ReferenceDataList['rows'][number]['provenance'], string> = {
  published: 'Published, and compared with the publication',
  publishedFromMemory: 'Published; the digits are quoted from memory and wait to be compared',
  commonPractice: 'Common practice, without a publication of its own',
};
