// Measures the JavaScript that the front page loads, compressed, against the limit. Run after `npm run build`.
import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { gzipSync } from 'node:zlib';

const limitBytes = 250_000;
const dist = path.resolve(import.meta.dirname, '../dist');
const assets = path.join(dist, 'assets');
const page = readFileSync(path.join(dist, 'index.html'), 'utf8');

const names = new Set();
const add = (name) => {
  if (names.has(name)) return;
  names.add(name);
  const source = readFileSync(path.join(assets, name), 'utf8');
  // Static imports only: `import"./x.js"` and `from"./x.js"`; lazy ones are written `import("./x.js")`.
  for (const [, imported] of source.matchAll(/(?:from|import)\s*["']\.\/([^"']+\.js)["']/g)) add(imported);
};
for (const [, name] of page.matchAll(/\/assets\/([^"]+\.js)"/g)) add(name);
for (const name of readdirSync(assets)) if (/^front\.route-.*\.js$/.test(name)) add(name);

let total = 0;
for (const name of names) {
  const bytes = gzipSync(readFileSync(path.join(assets, name)), { level: 9 }).length;
  total += bytes;
  console.log(`${String(bytes).padStart(9)}  ${name}`);
}
console.log(`${String(total).padStart(9)}  bytes of JavaScript, compressed, on the first screen (limit ${limitBytes})`);
if ([...names].some((name) => /grid/i.test(name))) {
  console.error('The data grid has come into the first screen.');
  process.exitCode = 1;
}
if (total > limitBytes) process.exitCode = 1;
