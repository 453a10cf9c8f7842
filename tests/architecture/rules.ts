import { builtinModules } from 'node:module';
import { posix } from 'node:path';
import ts from 'typescript';
import { isTestFile, lineOf, walk, type Project, type SourceFile } from './source-tree.js';

/** What breaks a rule, as one line that names the file. */
export type Violation = string;

const scope = '@faintward/';

/** Which libraries a library may import. A new library must be entered here, which is the moment to think about where it stands. */
export const libraryArrows: Readonly<Record<string, readonly string[]>> = {
  contracts: [],
  numerics: [],
  tables: [],
  astronomy: ['numerics'],
  cosmology: ['numerics'],
  ranking: ['numerics'],
  photometry: ['cosmology', 'numerics'],
  scheduling: ['astronomy', 'numerics'],
  exposure: ['astronomy', 'cosmology', 'numerics', 'photometry'],
};

const frameworks =
  /^(?:@nestjs\/|react(?:-dom|-router-dom|-hook-form)?(?:$|\/)|@mui\/|@emotion\/|@tanstack\/|drizzle-|express(?:$|\/)|@electric-sql\/|pg(?:-boss)?(?:$|\/)|rxjs(?:$|\/)|vite(?:$|\/))/;

const topLevelNames = ['README.md', 'DEVELOPERS.md', 'package.json', 'apps', 'libs', 'drizzle', 'seed', 'tests'];

/** Files by which tools are configured, at the place where each tool looks for its own. */
const toolConfiguration = /^(?:\..+|package-lock\.json|tsconfig(?:\.[a-z]+)*\.json|[a-z]+\.config\.[jt]s)$/;

/** web and api never import each other. */
export function webAndApiApart({ files }: Project): Violation[] {
  const forbidden: Readonly<Record<string, string>> = { 'apps/web': 'apps/api', 'apps/api': 'apps/web' };
  return files.flatMap((file) => {
    const other = forbidden[packageDirectoryOf(file.path)];
    if (other === undefined) return [];
    return file.imports
      .filter((specifier) => {
        const target = resolveRelative(file, specifier);
        return target === undefined
          ? packageOf(specifier) === `${scope}${other.slice('apps/'.length)}`
          : target.startsWith(`${other}/`);
      })
      .map((specifier) => `${file.path} imports ${specifier}: ${other} is the other side of HTTP`);
  });
}

/** The server converts: web knows the contracts and no science. */
export function webImportsContractsOnly({ files, packages }: Project): Violation[] {
  const allowed = `${scope}contracts`;
  const declared = packages
    .filter(({ directory }) => directory === 'apps/web')
    .flatMap(({ dependencies }) => dependencies.filter((name) => name.startsWith(scope) && name !== allowed))
    .map((name) => `apps/web/package.json depends on ${name}: web may use ${allowed} only`);
  const imported = filesUnder(files, 'apps/web').flatMap((file) =>
    file.imports
      .filter((specifier) => specifier.startsWith(scope) && packageOf(specifier) !== allowed)
      .map((specifier) => `${file.path} imports ${specifier}: web may use ${allowed} only`),
  );
  return [...declared, ...imported];
}

/** Libraries import each other downwards only. */
export function libraryArrowsPointDown({ files, packages }: Project): Violation[] {
  const libraries = packages.filter(({ directory }) => directory.startsWith('libs/'));
  const unknown = libraries
    .filter(({ directory }) => libraryArrows[libraryOf(directory)] === undefined)
    .map(({ directory }) => `${directory} has no place among the library arrows yet`);
  const mayUse = (library: string, specifier: string): boolean => {
    const other = packageOf(specifier).slice(scope.length);
    return other === library || (libraryArrows[library]?.includes(other) ?? false);
  };
  const declared = libraries.flatMap(({ directory, dependencies }) =>
    dependencies
      .filter((name) => name.startsWith(scope) && !mayUse(libraryOf(directory), name))
      .map((name) => `${directory}/package.json depends on ${name}, which is not below it`),
  );
  const imported = filesUnder(files, 'libs').flatMap((file) =>
    file.imports
      .filter((specifier) => specifier.startsWith(scope) && !mayUse(libraryOf(file.path), specifier))
      .map((specifier) => `${file.path} imports ${specifier}, which is not below it`),
  );
  return [...unknown, ...declared, ...imported];
}

/** Libraries know no framework. */
export function librariesImportNoFramework({ files, packages }: Project): Violation[] {
  const declared = packages
    .filter(({ directory }) => directory.startsWith('libs/'))
    .flatMap(({ directory, dependencies }) =>
      dependencies
        .filter((name) => frameworks.test(name))
        .map((name) => `${directory}/package.json depends on the framework ${name}`),
    );
  const imported = filesUnder(files, 'libs').flatMap((file) =>
    file.imports
      .filter((specifier) => frameworks.test(specifier))
      .map((specifier) => `${file.path} imports the framework ${specifier}`),
  );
  return [...declared, ...imported];
}

/** Libraries are pure: no file, network, console, environment, clock or chance. Their tests may read files. */
export function librariesDoNoInputOrOutput({ files }: Project): Violation[] {
  return filesUnder(files, 'libs')
    .filter(({ path }) => !isTestFile(path))
    .flatMap((file) => {
      const builtins = file.imports
        .filter((specifier) => specifier.startsWith('node:') || builtinModules.includes(specifier))
        .map((specifier) => `${file.path} imports ${specifier}: libraries do no input or output`);
      return [...builtins, ...impureUses(file)];
    });
}

/** Every library and application reaches the others by their package names, never by a path into their folder. */
export function relativeImportsStayInside({ files, packages }: Project): Violation[] {
  const directories = packages.map(({ directory }) => directory);
  return files
    .filter((file) => directories.includes(packageDirectoryOf(file.path)))
    .flatMap((file) => {
      const own = packageDirectoryOf(file.path);
      return file.imports
        .filter((specifier) => {
          const target = resolveRelative(file, specifier);
          return (
            target !== undefined &&
            directories.some((directory) => directory !== own && target.startsWith(`${directory}/`))
          );
        })
        .map((specifier) => `${file.path} imports ${specifier} by a path into another package`);
    });
}

/** What is imported from the workspace, and by a library from anywhere, is declared in the importing package. */
export function importsAreDeclared({ files, packages }: Project): Violation[] {
  const byDirectory = new Map(packages.map((entry) => [entry.directory, entry]));
  return files.flatMap((file) => {
    const own = byDirectory.get(packageDirectoryOf(file.path));
    if (own === undefined) return [];
    const mustBeDeclared = (specifier: string): boolean =>
      specifier.startsWith(scope) || (own.directory.startsWith('libs/') && !isTestFile(file.path) && isBare(specifier));
    return file.imports
      .filter(
        (specifier) =>
          mustBeDeclared(specifier) &&
          packageOf(specifier) !== own.name &&
          !own.dependencies.includes(packageOf(specifier)),
      )
      .map((specifier) => `${file.path} imports ${specifier}, which ${own.directory}/package.json does not declare`);
  });
}

/** An api module uses another through its service or read model; the module file is for wiring. */
export function apiModulesUseServices({ files }: Project): Violation[] {
  return acrossFolders(files, 'apps/api/src/modules').flatMap(({ file, specifier, target }) => {
    const isWiring = /\.module$/.test(target) && file.path.endsWith('.module.ts');
    if (isWiring || /\.(?:service|read-model)$/.test(target)) return [];
    return [`${file.path} imports ${specifier}: another module is used through its service or read model only`];
  });
}

/** A web feature imports no other feature. */
export function webFeaturesAreSeparate({ files }: Project): Violation[] {
  return acrossFolders(files, 'apps/web/src/features').map(
    ({ file, specifier }) => `${file.path} imports ${specifier}: a feature imports no other feature`,
  );
}

/** Nothing stands at the top of the repository but what the tree names, hidden files, and tool configuration. */
export function topLevelIsKnown(entries: readonly string[]): Violation[] {
  return entries
    .filter((name) => !topLevelNames.includes(name) && !toolConfiguration.test(name))
    .map((name) => `${name} has no place at the top of the repository`);
}

/** No test is focused, skipped or left to do. */
export function everyTestRuns({ files }: Project): Violation[] {
  const runners = ['it', 'test', 'describe', 'suite', 'bench'];
  const evasions = ['only', 'skip', 'todo', 'fixme', 'fails'];
  return files.flatMap((file) => {
    const found: Violation[] = [];
    walk(file.syntax, (node) => {
      if (ts.isPropertyAccessExpression(node) && evasions.includes(node.name.text)) {
        const runner = leftmostName(node);
        if (runner !== undefined && runners.includes(runner))
          found.push(`${file.path}:${lineOf(file, node)} has ${runner}.${node.name.text}`);
      }
      if (
        ts.isCallExpression(node) &&
        ts.isIdentifier(node.expression) &&
        /^(?:fit|fdescribe|xit|xtest|xdescribe)$/.test(node.expression.text)
      ) {
        found.push(`${file.path}:${lineOf(file, node)} has ${node.expression.text}`);
      }
    });
    return found;
  });
}

const impureGlobals = [
  'process',
  'console',
  'fetch',
  'XMLHttpRequest',
  'WebSocket',
  'performance',
  'crypto',
  'localStorage',
  'setTimeout',
  'setInterval',
  'setImmediate',
];

function impureUses(file: SourceFile): Violation[] {
  const found: Violation[] = [];
  const report = (node: ts.Node, what: string): void => {
    found.push(`${file.path}:${lineOf(file, node)} uses ${what}: libraries are pure`);
  };
  walk(file.syntax, (node) => {
    if (ts.isIdentifier(node) && impureGlobals.includes(node.text) && isFreeUse(node)) report(node, node.text);
    if (ts.isPropertyAccessExpression(node) && ts.isIdentifier(node.expression)) {
      const name = `${node.expression.text}.${node.name.text}`;
      if (name === 'Date.now' || name === 'Math.random') report(node, name);
    }
    const isDate = (expression: ts.Expression): boolean => ts.isIdentifier(expression) && expression.text === 'Date';
    if (ts.isNewExpression(node) && isDate(node.expression) && (node.arguments?.length ?? 0) === 0)
      report(node, 'new Date() without an instant');
    if (ts.isCallExpression(node) && isDate(node.expression)) report(node, 'Date()');
  });
  return found;
}

/** Whether an identifier stands for the global of its name, and not for a property, a key, or a type's member. */
function isFreeUse(node: ts.Identifier): boolean {
  const { parent } = node;
  if (ts.isPropertyAccessExpression(parent)) return parent.expression === node;
  if (ts.isPropertyAssignment(parent) || ts.isPropertySignature(parent) || ts.isPropertyDeclaration(parent))
    return parent.name !== node;
  if (
    ts.isMethodDeclaration(parent) ||
    ts.isMethodSignature(parent) ||
    ts.isBindingElement(parent) ||
    ts.isParameter(parent)
  )
    return false;
  return !ts.isQualifiedName(parent) && !ts.isImportSpecifier(parent) && !ts.isExportSpecifier(parent);
}

interface CrossImport {
  readonly file: SourceFile;
  readonly specifier: string;
  /** Without extension. */
  readonly target: string;
}

/** Imports that lead from one folder directly under `parent` into another. */
function acrossFolders(files: readonly SourceFile[], parent: string): CrossImport[] {
  const folderOf = (path: string): string | undefined =>
    path.startsWith(`${parent}/`) ? path.slice(parent.length + 1).split('/')[0] : undefined;
  return filesUnder(files, parent).flatMap((file) =>
    file.imports.flatMap((specifier) => {
      const target = resolveRelative(file, specifier);
      const folder = target === undefined ? undefined : folderOf(target);
      if (target === undefined || folder === undefined || folder === folderOf(file.path)) return [];
      return [{ file, specifier, target: target.replace(/\.[jt]sx?$/, '') }];
    }),
  );
}

function filesUnder(files: readonly SourceFile[], directory: string): SourceFile[] {
  return files.filter(({ path }) => path.startsWith(`${directory}/`));
}

function packageDirectoryOf(path: string): string {
  return path.split('/').slice(0, 2).join('/');
}

function libraryOf(path: string): string {
  return path.split('/')[1] ?? '';
}

function isBare(specifier: string): boolean {
  return !specifier.startsWith('.') && !specifier.startsWith('/') && !specifier.startsWith('node:');
}

/** '@faintward/astronomy' of '@faintward/astronomy/time', 'csv-parse' of 'csv-parse/sync'. */
function packageOf(specifier: string): string {
  return specifier
    .split('/')
    .slice(0, specifier.startsWith('@') ? 2 : 1)
    .join('/');
}

function resolveRelative(file: SourceFile, specifier: string): string | undefined {
  return specifier.startsWith('.') ? posix.join(posix.dirname(file.path), specifier) : undefined;
}

/** 'describe' of describe.concurrent.only. */
function leftmostName(node: ts.Expression): string | undefined {
  let left: ts.Expression = node;
  while (ts.isPropertyAccessExpression(left) || ts.isCallExpression(left)) left = left.expression;
  return ts.isIdentifier(left) ? left.text : undefined;
}
