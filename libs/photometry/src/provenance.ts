/** What a number rests on: a publication that was read, one quoted from memory, or what is usual. */
export type Provenance = 'published' | 'publishedFromMemory' | 'commonPractice';
/** Of a file: `mixed` where its rows differ and each says for itself. */
export type FileProvenance = Provenance | 'mixed';
