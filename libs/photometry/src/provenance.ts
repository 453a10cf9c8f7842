/** What a number rests on: a publication that was read, one quoted from memory, or what is usual. */
export type Provenance = 'published' | 'publishedFromMemory' | 'commonPractice';
