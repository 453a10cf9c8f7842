import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import {
  apiModulesUseServices,
  everyTestRuns,
  importsAreDeclared,
  librariesDoNoInputOrOutput,
  librariesImportNoFramework,
  libraryArrows,
  libraryArrowsPointDown,
  relativeImportsStayInside,
  topLevelIsKnown,
  webAndApiApart,
  webFeaturesAreSeparate,
  webImportsContractsOnly,
  type Violation,
} from './rules.js';
import { readProject, sourceFile, topLevelEntries, type Package, type Project } from './source-tree.js';

const root = fileURLToPath(new URL('../..', import.meta.url));

function expectNone(violations: readonly Violation[]): void {
  expect(violations, `\n${violations.join('\n')}\n`).toEqual([]);
}

describe('the project', () => {
  const project = readProject(root);

  it('is read whole: every library and both applications have files', () => {
    for (const { directory } of project.packages) {
      expect(
        project.files.some(({ path }) => path.startsWith(`${directory}/src/`)),
        `${directory} has no sources`,
      ).toBe(true);
    }
    expect(project.packages.map(({ directory }) => directory)).toEqual(
      expect.arrayContaining(['apps/api', 'apps/web', 'libs/contracts']),
    );
  });

  it('keeps web and api apart', () => expectNone(webAndApiApart(project)));
  it('gives web the contracts and no science', () => expectNone(webImportsContractsOnly(project)));
  it('points the arrows of the libraries downwards', () => expectNone(libraryArrowsPointDown(project)));
  it('keeps frameworks out of the libraries', () => expectNone(librariesImportNoFramework(project)));
  it('keeps input, output, clock and chance out of the libraries', () =>
    expectNone(librariesDoNoInputOrOutput(project)));
  it('reaches other packages by name, not by path', () => expectNone(relativeImportsStayInside(project)));
  it('declares what it imports', () => expectNone(importsAreDeclared(project)));
  it('lets api modules use each other through services and read models', () =>
    expectNone(apiModulesUseServices(project)));
  it('keeps web features separate', () => expectNone(webFeaturesAreSeparate(project)));
  it('has nothing at the top that the tree does not name', () => expectNone(topLevelIsKnown(topLevelEntries(root))));
  it('runs every test', () => expectNone(everyTestRuns(project)));

  it('has no circle among the library arrows', () => {
    const visit = (library: string, above: readonly string[]): void => {
      expect(above, `${[...above, library].join(' → ')} is a circle`).not.toContain(library);
      for (const below of libraryArrows[library] ?? []) visit(below, [...above, library]);
    };
    for (const library of Object.keys(libraryArrows)) visit(library, []);
  });
});

/** Small projects that break one rule each, and their neighbours that do not: a rule that cannot fail is no rule. */
describe('the rules', () => {
  function project(files: Readonly<Record<string, string>>, packages: readonly Package[] = []): Project {
    return { files: Object.entries(files).map(([path, text]) => sourceFile(path, text)), packages };
  }
  function aPackage(directory: string, dependencies: readonly string[] = []): Package {
    return { directory, name: `@faintward/${directory.split('/')[1] ?? ''}`, dependencies };
  }

  it.each([
    ['a static import', `import { x } from '../../api/src/x.js';`],
    ['a type import', `import type { X } from '@faintward/api';`],
    ['a re-export', `export * from '../../api/src/x.js';`],
    ['a dynamic import', `const x = await import('../../api/src/x.js');`],
    ['an import type', `type X = import('@faintward/api').X;`],
  ])('notice that web imports the api by %s', (_, text) => {
    expect(webAndApiApart(project({ 'apps/web/src/main.ts': text }))).toEqual([
      expect.stringContaining('apps/web/src/main.ts'),
    ]);
  });

  it('notice that the api imports web, and do not mind imports in strings and comments', () => {
    expect(webAndApiApart(project({ 'apps/api/src/a.ts': `import '../../web/src/x.js';` }))).toHaveLength(1);
    expect(
      webAndApiApart(
        project({ 'apps/web/src/a.ts': `// import '@faintward/api'\nconst s = "import '@faintward/api'";` }),
      ),
    ).toEqual([]);
  });

  it('notice science in web, in its sources and in its dependencies', () => {
    const files = {
      'apps/web/src/a.ts': `import { airmass } from '@faintward/astronomy';`,
      'apps/web/src/b.ts': `import { Score } from '@faintward/contracts';`,
    };
    const found = webImportsContractsOnly(
      project(files, [aPackage('apps/web', ['@faintward/contracts', '@faintward/cosmology', 'react'])]),
    );
    expect(found).toEqual([
      expect.stringContaining('@faintward/cosmology'),
      expect.stringContaining('apps/web/src/a.ts'),
    ]);
  });

  it('notice an arrow that points up, sideways, or from nowhere', () => {
    const up = project({ 'libs/numerics/src/a.ts': `import { airmass } from '@faintward/astronomy';` });
    const sideways = project({ 'libs/cosmology/src/a.ts': `import '@faintward/astronomy/time';` });
    const down = project({ 'libs/exposure/src/a.ts': `import '@faintward/photometry';` });
    expect(libraryArrowsPointDown(up)).toHaveLength(1);
    expect(libraryArrowsPointDown(sideways)).toHaveLength(1);
    expect(libraryArrowsPointDown(down)).toEqual([]);
    expect(libraryArrowsPointDown(project({}, [aPackage('libs/tables', ['@faintward/ranking'])]))).toHaveLength(1);
    expect(libraryArrowsPointDown(project({}, [aPackage('libs/invented')]))).toEqual([
      'libs/invented has no place among the library arrows yet',
    ]);
  });

  it.each([
    '@nestjs/common',
    'react',
    'react-dom/client',
    'drizzle-orm/pg-core',
    'express',
    '@mui/material',
    'pg',
    '@electric-sql/pglite',
  ])('notice the framework %s in a library', (name) => {
    expect(librariesImportNoFramework(project({ 'libs/ranking/src/a.ts': `import x from '${name}';` }))).toHaveLength(
      1,
    );
    expect(librariesImportNoFramework(project({}, [aPackage('libs/ranking', [name])]))).toHaveLength(1);
    expect(librariesImportNoFramework(project({ 'apps/api/src/a.ts': `import x from '${name}';` }))).toEqual([]);
  });

  it('do not take other packages for frameworks', () => {
    expect(
      librariesImportNoFramework(
        project({ 'libs/tables/src/a.ts': `import 'csv-parse/sync'; import 'zod'; import 'pgn'; import 'reactive';` }),
      ),
    ).toEqual([]);
  });

  it.each([
    ['a file', `import { readFileSync } from 'node:fs';`],
    ['a file by the old name', `import fs from 'fs';`],
    ['the environment', `export const x = process.env['X'];`],
    ['the clock', `export const x = () => Date.now();`],
    ['the clock as a date', `export const x = () => new Date();`],
    ['the clock as text', `export const x = () => Date();`],
    ['chance', `export const x = () => Math.random();`],
    ['the console', `console.log(1);`],
    ['the network', `export const x = () => fetch('/');`],
    ['a timer', `setTimeout(() => 1, 10);`],
    ['another timer', `export const x = () => performance.now();`],
  ])('notice %s in a library', (_, text) => {
    expect(librariesDoNoInputOrOutput(project({ 'libs/numerics/src/a.ts': text }))).toEqual([
      expect.stringContaining('libs/numerics/src/a.ts'),
    ]);
    expect(librariesDoNoInputOrOutput(project({ 'libs/numerics/src/a.test.ts': text }))).toEqual([]);
  });

  it('let a library handle a given instant and name its own things as it likes', () => {
    const text = `export const f = (at: Date, input: { process: number }) => new Date(at.getTime() + input.process); // process.env, Date.now()`;
    expect(librariesDoNoInputOrOutput(project({ 'libs/numerics/src/a.ts': text }))).toEqual([]);
  });

  it('notice a path into another package', () => {
    const packages = [aPackage('libs/numerics'), aPackage('libs/astronomy')];
    expect(
      relativeImportsStayInside(project({ 'libs/astronomy/src/a.ts': `import '../../numerics/src/b.js';` }, packages)),
    ).toHaveLength(1);
    expect(relativeImportsStayInside(project({ 'libs/astronomy/src/a.ts': `import './b.js';` }, packages))).toEqual([]);
  });

  it('notice an import that is not declared', () => {
    const packages = [
      aPackage('libs/astronomy', ['@faintward/numerics']),
      aPackage('apps/api', ['@faintward/contracts']),
    ];
    const files = {
      'libs/astronomy/src/a.ts': `import '@faintward/numerics'; import 'undeclared/deep';`,
      'libs/astronomy/src/a.test.ts': `import 'vitest';`,
      'apps/api/src/a.ts': `import '@faintward/contracts/errors'; import '@faintward/tables'; import 'zod';`,
    };
    expect(importsAreDeclared(project(files, packages))).toEqual([
      expect.stringContaining('undeclared/deep'),
      expect.stringContaining('@faintward/tables'),
    ]);
  });

  it('notice an api module that reaches into another', () => {
    const at = 'apps/api/src/modules/targets/targets.service.ts';
    const allowed = `import '../proposals/proposals.service.js'; import '../proposals/proposals.read-model.js'; import './targets.queries.js'; import '../../database/tx.js';`;
    expect(apiModulesUseServices(project({ [at]: allowed }))).toEqual([]);
    for (const target of ['queries', 'controller', 'mapper', 'module']) {
      expect(apiModulesUseServices(project({ [at]: `import '../proposals/proposals.${target}.js';` }))).toHaveLength(1);
    }
    expect(
      apiModulesUseServices(
        project({ 'apps/api/src/modules/targets/targets.module.ts': `import '../proposals/proposals.module.js';` }),
      ),
    ).toEqual([]);
  });

  it('notice a feature that imports another', () => {
    const at = 'apps/web/src/features/targets/components/TargetsTable.tsx';
    expect(
      webFeaturesAreSeparate(
        project({ [at]: `import { x } from '../../proposals/api/x'; export const T = () => <div />;` }),
      ),
    ).toHaveLength(1);
    expect(
      webFeaturesAreSeparate(project({ [at]: `import { x } from '../api/x'; import { y } from '../../../ui/y';` })),
    ).toEqual([]);
  });

  it('notice something new at the top', () => {
    expect(
      topLevelIsKnown([
        'README.md',
        '.gitignore',
        'tsconfig.build.base.json',
        'vitest.config.ts',
        'package-lock.json',
        'libs',
      ]),
    ).toEqual([]);
    expect(topLevelIsKnown(['docs', 'notes.txt', 'config.json'])).toHaveLength(3);
  });

  it.each([
    'it.only',
    'it.skip',
    'it.todo',
    'test.skip',
    'describe.only',
    'describe.concurrent.skip',
    'test.describe.only',
    'test.fixme',
    'it.fails',
  ])('notice %s', (call) => {
    expect(everyTestRuns(project({ 'libs/numerics/src/a.test.ts': `${call}('x', () => {});` }))).toEqual([
      expect.stringContaining('libs/numerics/src/a.test.ts:1'),
    ]);
  });

  it('notice the short forms, and leave alone what only looks like them', () => {
    expect(everyTestRuns(project({ 'tests/a.test.ts': `xit('x', () => {}); fdescribe('y', () => {});` }))).toHaveLength(
      2,
    );
    expect(
      everyTestRuns(
        project({
          'tests/a.test.ts': `it('skips nothing', () => { page.skip(); list.only; }); it.each([1])('x', () => {});`,
        }),
      ),
    ).toEqual([]);
  });
});
