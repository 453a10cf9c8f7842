import { z } from 'zod';

/** Identifier of any stored object. */
export const Id = z.uuid();
export type Id = z.infer<typeof Id>;

/** An instant on the wire: ISO 8601 in UTC with a trailing Z. */
export const Instant = z.iso.datetime();

/** A civil date, `YYYY-MM-DD`. A night is named by the local date of its evening. */
export const CivilDate = z.iso.date();

/** One line of text a person typed: trimmed, never empty, no control characters. */
export function line(maxLength: number) {
  return z
    .string()
    .trim()
    .min(1, { error: 'Please fill this in.' })
    .max(maxLength, { error: `At most ${maxLength} characters.` })
    .refine((text) => !hasControlCharacters(text, ''), { error: 'Control characters are not allowed here.' });
}

/** Text of several lines; may be empty. */
export function prose(maxLength: number) {
  return z
    .string()
    .max(maxLength, { error: `At most ${maxLength} characters.` })
    .refine((text) => !hasControlCharacters(text, '\n\r\t'), { error: 'Control characters are not allowed here.' });
}

const loneSurrogate = /\p{Surrogate}/u;

/** PostgreSQL text cannot hold NUL or half a character, and other control characters only ever arrive by accident. */
function hasControlCharacters(text: string, allowed: string): boolean {
  if (loneSurrogate.test(text)) return true;
  for (const character of text) {
    const code = character.codePointAt(0) ?? 0;
    if ((code < 32 || code === 127) && !allowed.includes(character)) return true;
  }
  return false;
}

/** Version of a stored row; travels as `ETag: "7"` and comes back as `If-Match: "7"`. */
export const Version = z.int().min(1);

/** Longest page a list answers. */
export const MAX_PAGE_SIZE = 500;

export const ListQuery = z.object({
  page: z.coerce.number().int().min(1).max(1_000_000).default(1),
  pageSize: z.coerce.number().int().min(1).max(MAX_PAGE_SIZE).default(50),
  sort: z.string().max(60).optional(),
  order: z.enum(['asc', 'desc']).default('asc'),
  search: z.string().max(200).optional(),
});
export type ListQuery = z.output<typeof ListQuery>;

/** A page of rows, with the number of rows that match in all. */
export function pageOf<Row extends z.ZodType>(row: Row) {
  return z.object({ rows: z.array(row), rowCount: z.int().min(0), page: z.int(), pageSize: z.int() });
}

/** A caution or hint that belongs to a value; `code` is stable, `message` is for the person. */
export const Notice = z
  .object({
    code: z.string(),
    message: z.string(),
    severity: z.enum(['note', 'warning', 'error']).default('warning'),
    field: z.string().optional(),
  })
  .meta({ id: 'Notice' });
export type Notice = z.infer<typeof Notice>;

export const Acknowledgement = z.object({ ok: z.literal(true) }).meta({ id: 'Acknowledgement' });
export type Acknowledgement = z.infer<typeof Acknowledgement>;
