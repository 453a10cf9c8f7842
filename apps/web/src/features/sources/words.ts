import type { ReferenceDataList } from '@faintward/contracts/light-report';

/** Where a number comes from, in a sentence each. */
export const provenanceLong: Record<ReferenceDataList['rows'][number]['provenance'], string> = {
  published: 'Published in the source named',
  publishedFromMemory: 'Published; its digits are quoted from memory and are still to be compared',
  commonPractice: 'Common practice, without a publication of its own',
  mixed: 'In part published, in part common practice or quoted from memory; each row says which',
};
