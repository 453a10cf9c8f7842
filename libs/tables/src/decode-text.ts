import { TableRefused } from './table-refused.js';

export type TextEncoding = 'utf-8' | 'utf-16le' | 'utf-16be' | 'windows-1252';

export interface DecodedText {
  readonly text: string;
  /** What the bytes were read as. `windows-1252` is a guess made when they are not UTF-8: worth showing in a preview. */
  readonly encoding: TextEncoding;
}

interface KnownBinary {
  readonly signature: readonly number[];
  readonly code: 'spreadsheet-file' | 'binary';
  readonly reason: string;
}

const saveAsText = 'Save the sheet as CSV or tab-separated text and send that.';

const knownBinaries: readonly KnownBinary[] = [
  {
    signature: [0x50, 0x4b, 0x03, 0x04],
    code: 'spreadsheet-file',
    reason: `This is a ZIP container (a spreadsheet or document file, or a ZIP archive), not text. ${saveAsText}`,
  },
  {
    signature: [0xd0, 0xcf, 0x11, 0xe0],
    code: 'spreadsheet-file',
    reason: `This is an old binary office document, not text. ${saveAsText}`,
  },
  { signature: [0x25, 0x50, 0x44, 0x46], code: 'binary', reason: 'This is a PDF, not a table of text.' },
  { signature: [0x1f, 0x8b], code: 'binary', reason: 'This is a gzip-compressed file. Unpack it first.' },
  { signature: [0x89, 0x50, 0x4e, 0x47], code: 'binary', reason: 'This is a PNG picture, not a table of text.' },
];

/**
 * Text of an uploaded table file.
 *
 * A byte order mark decides between UTF-8 and UTF-16; without one the bytes are UTF-8 if they are valid UTF-8, and otherwise Windows-1252,
 * the usual encoding of a spreadsheet's CSV export on a western system. The byte order mark is not part of the text.
 *
 * @throws {TableRefused} `spreadsheet-file` or `binary` for a known binary format or NUL bytes, `encoding` if a byte order mark promises an encoding
 *   that the bytes do not keep
 */
export function decodeText(bytes: Uint8Array): DecodedText {
  for (const { signature, code, reason } of knownBinaries) {
    if (signature.every((byte, index) => bytes[index] === byte)) throw new TableRefused(code, reason);
  }
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return decodeMarked(bytes, 'utf-16le');
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return decodeMarked(bytes, 'utf-16be');
  if (bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf) return decodeMarked(bytes, 'utf-8');

  if (bytes.includes(0)) {
    throw new TableRefused(
      'binary',
      'The file contains NUL bytes: it is binary, or UTF-16 text without a byte order mark. Save it as UTF-8 text.',
    );
  }
  const utf8 = tryDecode(bytes, 'utf-8');
  if (utf8 !== undefined) return { text: utf8, encoding: 'utf-8' };
  return { text: new TextDecoder('windows-1252').decode(bytes), encoding: 'windows-1252' };
}

function decodeMarked(bytes: Uint8Array, encoding: 'utf-8' | 'utf-16le' | 'utf-16be'): DecodedText {
  const text = tryDecode(bytes, encoding);
  if (text === undefined) {
    throw new TableRefused(
      'encoding',
      `The file begins like ${encoding.toUpperCase()} text but is not valid in that encoding. Save it as UTF-8 text.`,
    );
  }
  return { text, encoding };
}

function tryDecode(bytes: Uint8Array, encoding: string): string | undefined {
  try {
    return new TextDecoder(encoding, { fatal: true }).decode(bytes);
  } catch (error) {
    // The Encoding standard reports invalid bytes as a TypeError; anything else is not ours to interpret.
    if (error instanceof TypeError) return undefined;
    throw error;
  }
}
