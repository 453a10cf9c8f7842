// Runs every benchmark of tests/bench in turn and prints its table. Figures are ratios to a plain baseline in the same run.
import { readdirSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

const folder = new URL('../tests/bench/', import.meta.url);
const wanted = process.argv.slice(2);
for (const name of readdirSync(fileURLToPath(folder))
  .filter((file) => file.endsWith('.bench.mjs'))
  .sort()) {
  if (wanted.length > 0 && !wanted.some((word) => name.includes(word))) continue;
  console.log(`\n== ${name.replace('.bench.mjs', '')}`);
  const { run } = await import(new URL(name, folder).href);
  await run();
}
