// Three watchers side by side: the compiler, the api (restarted on each build) and Vite. Ctrl+C ends all.
import { spawn, spawnSync } from 'node:child_process';
import process from 'node:process';

spawnSync('npx', ['tsc', '-b', 'tsconfig.build.json'], { stdio: 'inherit' });
const children = [
  ['npx', ['tsc', '-b', 'tsconfig.build.json', '-w', '--preserveWatchOutput']],
  ['node', ['--watch', '--watch-preserve-output', '--enable-source-maps', 'apps/api/dist/main.js']],
  ['npx', ['vite', 'apps/web']],
].map(([command, args]) => spawn(command, args, { stdio: 'inherit' }));

let ending = false;
function end(code) {
  if (ending) return;
  ending = true;
  for (const child of children) child.kill('SIGTERM');
  setTimeout(() => process.exit(code), 500);
}
process.on('SIGINT', () => end(0));
process.on('SIGTERM', () => end(0));
for (const child of children) child.on('exit', (code) => end(code ?? 1));
