import { readdirSync, readFileSync } from 'node:fs';
import { join, relative, sep } from 'node:path';
import ts from 'typescript';

/** A file of the project, with what the rules need to know of it. */
export interface SourceFile {
  /** From the repository's root, with slashes. */
  readonly path: string;
  /** What it imports or re-exports, types included, as written: 'zod', './x.js', '@faintward/numerics'. */
  readonly imports: readonly string[];
  readonly syntax: ts.SourceFile;
}

export interface Package {
  /** From the repository's root: 'libs/numerics'. */
  readonly directory: string;
  readonly name: string;
  /** Names under dependencies, devDependencies and peerDependencies. */
  readonly dependencies: readonly string[];
}

export interface Project {
  readonly files: readonly SourceFile[];
  readonly packages: readonly Package[];
}

/** A source file from its text; the examples of the rules' own tests are made this way too. */
export function sourceFile(path: string, text: string): SourceFile {
  const kind = path.endsWith('x') ? ts.ScriptKind.TSX : ts.ScriptKind.TS;
  const syntax = ts.createSourceFile(path, text, ts.ScriptTarget.ES2023, true, kind);
  return { path, imports: importsOf(syntax), syntax };
}

export function readProject(root: string): Project {
  const directories = ['libs', 'apps'].flatMap((parent) =>
    readdirSync(join(root, parent)).map((name) => `${parent}/${name}`),
  );
  const packages = directories.map((directory) => readPackage(root, directory));
  const files = [...directories.map((directory) => `${directory}/src`), 'tests', 'seed'].flatMap((directory) =>
    readFiles(root, join(root, directory)),
  );
  return { files, packages };
}

/** Names at the top of the repository, without those that .gitignore keeps out of it. */
export function topLevelEntries(root: string): string[] {
  const ignored = readFileSync(join(root, '.gitignore'), 'utf8')
    .split('\n')
    .map((line) => line.trim().replace(/\/$/, ''))
    .filter((line) => line !== '' && !line.startsWith('#'));
  const isIgnored = (name: string): boolean =>
    ignored.some((pattern) => (pattern.startsWith('*') ? name.endsWith(pattern.slice(1)) : name === pattern));
  return readdirSync(root).filter((name) => !isIgnored(name));
}

/** Calls `visit` for every node of a file. */
export function walk(node: ts.Node, visit: (node: ts.Node) => void): void {
  visit(node);
  ts.forEachChild(node, (child) => walk(child, visit));
}

export function lineOf(file: SourceFile, node: ts.Node): number {
  return file.syntax.getLineAndCharacterOfPosition(node.getStart(file.syntax)).line + 1;
}

export function isTestFile(path: string): boolean {
  return /\.(?:test|bench)\.tsx?$/.test(path);
}

function readPackage(root: string, directory: string): Package {
  const manifest = JSON.parse(readFileSync(join(root, directory, 'package.json'), 'utf8')) as {
    name: string;
    dependencies?: Record<string, string>;
    devDependencies?: Record<string, string>;
    peerDependencies?: Record<string, string>;
  };
  const dependencies = Object.keys({
    ...manifest.dependencies,
    ...manifest.devDependencies,
    ...manifest.peerDependencies,
  });
  return { directory, name: manifest.name, dependencies };
}

function readFiles(root: string, directory: string): SourceFile[] {
  return readdirSync(directory, { withFileTypes: true, recursive: true })
    .filter((entry) => entry.isFile() && /\.tsx?$/.test(entry.name))
    .map((entry) => join(entry.parentPath, entry.name))
    .filter((path) => !path.includes('node_modules'))
    .sort()
    .map((path) => sourceFile(relative(root, path).split(sep).join('/'), readFileSync(path, 'utf8')));
}

function importsOf(syntax: ts.SourceFile): string[] {
  const imports: string[] = [];
  const add = (specifier: ts.Node | undefined): void => {
    if (specifier && ts.isStringLiteralLike(specifier)) imports.push(specifier.text);
  };
  walk(syntax, (node) => {
    if (ts.isImportDeclaration(node) || ts.isExportDeclaration(node)) add(node.moduleSpecifier);
    else if (ts.isImportEqualsDeclaration(node) && ts.isExternalModuleReference(node.moduleReference))
      add(node.moduleReference.expression);
    else if (ts.isImportTypeNode(node) && ts.isLiteralTypeNode(node.argument)) add(node.argument.literal);
    else if (ts.isCallExpression(node)) {
      const isDynamicImport = node.expression.kind === ts.SyntaxKind.ImportKeyword;
      const isRequire = ts.isIdentifier(node.expression) && node.expression.text === 'require';
      if (isDynamicImport || isRequire) add(node.arguments[0]);
    }
  });
  return imports;
}
