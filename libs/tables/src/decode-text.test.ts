import { describe, expect, it } from 'vitest';
import { decodeText, readDelimitedText } from './index.js';

const utf8 = (text: string): Uint8Array => new TextEncoder().encode(text);

function utf16(text: string, littleEndian: boolean): Uint8Array {
  const bytes = new Uint8Array(2 + 2 * text.length);
  const view = new DataView(bytes.buffer);
  view.setUint16(0, 0xfeff, littleEndian);
  for (let index = 0; index < text.length; index += 1)
    view.setUint16(2 + 2 * index, text.charCodeAt(index), littleEndian);
  return bytes;
}

describe('decoding a table file', () => {
  it('reads UTF-8 with and without byte order mark', () => {
    expect(decodeText(utf8('δ,z'))).toEqual({ text: 'δ,z', encoding: 'utf-8' });
    expect(decodeText(utf8('\ufeffδ,z'))).toEqual({ text: 'δ,z', encoding: 'utf-8' });
  });

  it('reads UTF-16 of both byte orders', () => {
    expect(decodeText(utf16('δ,z', true))).toEqual({ text: 'δ,z', encoding: 'utf-16le' });
    expect(decodeText(utf16('δ,z', false))).toEqual({ text: 'δ,z', encoding: 'utf-16be' });
  });

  it('takes bytes that are not UTF-8 for Windows-1252 and says so', () => {
    expect(decodeText(Uint8Array.of(0x35, 0xb0))).toEqual({ text: '5°', encoding: 'windows-1252' });
  });

  it.each([
    ['a zipped spreadsheet', [0x50, 0x4b, 0x03, 0x04, 0x14], 'spreadsheet-file'],
    ['an old spreadsheet', [0xd0, 0xcf, 0x11, 0xe0, 0xa1], 'spreadsheet-file'],
    ['a PDF', [...utf8('%PDF-1.7')], 'binary'],
    // RFC 1952 and the PNG specification, section 5.2.
    ['a gzip file', [0x1f, 0x8b, 0x08, 0x41], 'binary'],
    ['a PNG picture', [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a], 'binary'],
    ['NUL bytes', [0x41, 0x00, 0x42], 'binary'],
    ['half a UTF-16 character', [0xff, 0xfe, 0x41], 'encoding'],
  ])('refuses %s', (_, bytes, code) => {
    expect(() => decodeText(Uint8Array.from(bytes))).toThrow(expect.objectContaining({ name: 'TableRefused', code }));
  });

  it('leaves an empty file to the reader', () => {
    expect(() => readDelimitedText(decodeText(new Uint8Array()).text)).toThrow(
      expect.objectContaining({ code: 'empty' }),
    );
  });
});
