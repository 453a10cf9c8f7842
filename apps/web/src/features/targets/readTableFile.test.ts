import { describe, expect, it } from 'vitest';
import { readTableFile } from './readTableFile';

const file = (bytes: BlobPart[]) => new File(bytes, 'list.csv');

describe('a chosen file', () => {
  it('is read as UTF-8', async () => {
    expect(await readTableFile(file(['name,z\nα,7']))).toEqual({ ok: true, text: 'name,z\nα,7' });
  });

  it('is refused by its size before it is read', async () => {
    const large = { name: 'all.csv', size: 200_000_000, arrayBuffer: () => Promise.reject(new Error('was read')) };
    const answer = await readTableFile(large);
    expect(answer).toMatchObject({ ok: false, message: expect.stringContaining('200 MB') as string });
  });

  it.each([
    ['bytes that are no UTF-8', new Uint8Array([0xff, 0xfe, 0x41, 0x00])],
    ['NUL characters', new Uint8Array([0x50, 0x4b, 0x00, 0x04])],
  ])('is refused for %s', async (_what, bytes) => {
    expect(await readTableFile(file([bytes]))).toMatchObject({
      ok: false,
      message: expect.stringContaining('not a text file') as string,
    });
  });
});
