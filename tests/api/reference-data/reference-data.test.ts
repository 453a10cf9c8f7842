import { createHash } from 'node:crypto';
import { cpSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { ReferenceDataList } from '@faintward/contracts/light-report';
import { ReferenceFileError } from '@faintward/photometry/reference-files';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import {
  loadReferenceFiles,
  readReferenceFiles,
  REFERENCE_FOLDER,
} from '../../../apps/api/src/reference-data/reference-data.js';
import { explain } from '../../../apps/api/src/startup.js';
import { createTestApp, type TestApp } from '../support/app.js';

const FILES = readdirSync(REFERENCE_FOLDER)
  .filter((name) => name.endsWith('.json'))
  .sort();

function read(name: string): string {
  return readFileSync(path.join(REFERENCE_FOLDER, name), 'utf8');
}

describe('GET /reference-data', () => {
  let app: TestApp;

  beforeAll(async () => {
    app = await createTestApp();
  });
  afterAll(() => app.close());

  it('tells anybody what the numbers rest on: every file with its source, and a hash of its content', async () => {
    const { body } = await app.http().get('/api/v1/reference-data').expect(200);
    const { version, rows } = ReferenceDataList.parse(body);
    expect(rows.map(({ file }) => file)).toEqual(FILES);
    expect(version).toBe(loadReferenceFiles().version);
    for (const { file, title, source, contentHash } of rows) {
      const { meta } = JSON.parse(read(file)) as { meta: Record<string, string> };
      expect({ title, source }).toEqual({ title: meta['title'], source: meta['source'] });
      expect(contentHash).toBe(createHash('sha256').update(read(file)).digest('hex').slice(0, 12));
    }
  });
});

describe('the files of reference data', () => {
  it.each(FILES)('%s says all about itself, and is named in the README', (file) => {
    const { meta } = JSON.parse(read(file)) as { meta: Record<string, string> };
    expect(Object.keys(meta).sort()).toEqual(['licence', 'notes', 'provenance', 'source', 'title', 'units']);
    for (const [key, value] of Object.entries(meta)) expect(value.trim(), key).not.toBe('');
    expect(read('README.md')).toContain(`| \`${file}\` |`);
    // A licence with a notice to carry refers to the file that carries it.
    if (meta['licence']!.includes('LICENCES.md')) expect(read('LICENCES.md')).toContain(file);
  });

  it.each(FILES)('%s is called mixed where its rows say something else than the file', (file) => {
    const { meta, data } = JSON.parse(read(file)) as { meta: { provenance: string }; data: unknown };
    const ofRows = [...JSON.stringify(data).matchAll(/"\w*[pP]rovenance":"(\w+)"/g)].map(([, word]) => word);
    if (ofRows.some((word) => word !== meta.provenance)) expect(meta.provenance).toBe('mixed');
    else expect(meta.provenance).not.toBe('mixed');
  });

  it('named in the README are there', () => {
    const named = [...read('README.md').matchAll(/^\| `([^`]+)` \|/gm)].map(([, name]) => name);
    expect(named.sort()).toEqual(FILES);
  });
});

describe('reading a folder of reference data', () => {
  let folder: string;

  beforeEach(() => {
    folder = mkdtempSync(path.join(tmpdir(), 'reference-'));
    cpSync(REFERENCE_FOLDER, folder, { recursive: true });
  });
  afterEach(() => rmSync(folder, { recursive: true }));

  function change(file: string, replace: (text: string) => string): void {
    writeFileSync(path.join(folder, file), replace(read(file)));
  }

  it('gives the same version for the same files, wherever they are', () => {
    expect(readReferenceFiles(folder).version).toBe(readReferenceFiles(REFERENCE_FOLDER).version);
  });

  it('gives another version, and that file another hash, when a file changes', () => {
    const before = readReferenceFiles(folder);
    change('lines.json', (text) => text.replace('656.4614', '656.4615'));
    const after = readReferenceFiles(folder);
    expect(after.version).not.toBe(before.version);
    const changed = after.files.filter(({ contentHash }, i) => contentHash !== before.files[i]!.contentHash);
    expect(changed.map(({ file }) => file)).toEqual(['lines.json']);
  });

  it('reads and lists a file that nothing calculates with yet, if it says what it is', () => {
    const { meta } = JSON.parse(read('lines.json')) as { meta: object };
    writeFileSync(path.join(folder, 'another.json'), JSON.stringify({ meta, data: [1] }));
    expect(readReferenceFiles(folder).files.map(({ file }) => file)).toContain('another.json');
    writeFileSync(path.join(folder, 'another.json'), JSON.stringify({ data: [1] }));
    expect(() => readReferenceFiles(folder)).toThrow('Reference data another.json: meta');
  });

  it('ends a start with what is wrong, and no stack', () => {
    expect(explain(new ReferenceFileError('bands.json', 'is missing'))).toBe('Reference data bands.json: is missing');
  });

  it('names the file, and the place in it, that cannot be used', () => {
    change('bands.json', (text) => text.replace('"vegaToAbMag": 0.79', '"vegaToAbMag": "0.79"'));
    expect(() => readReferenceFiles(folder)).toThrow(ReferenceFileError);
    expect(() => readReferenceFiles(folder)).toThrow('Reference data bands.json: data.bands.0.vegaToAbMag');
    change('bands.json', (text) => text.slice(0, -10));
    expect(() => readReferenceFiles(folder)).toThrow('Reference data bands.json: is not JSON');
    rmSync(path.join(folder, 'bands.json'));
    expect(() => readReferenceFiles(folder)).toThrow('Reference data bands.json: is missing');
    const absent = path.join(folder, 'absent');
    expect(() => readReferenceFiles(absent)).toThrow(`Reference data ${absent}: cannot be listed`);
  });
});
