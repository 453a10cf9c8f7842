// Makes a fresh clone ready: checks Node.js, installs exactly what the lock file names when it changed, and builds.
// Flags: --no-build (dependencies only), --browser (also finds or installs Chromium for the end-to-end tests).
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import process from 'node:process';
import { fileURLToPath } from 'node:url';

const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '..');
process.chdir(root);

const [major, minor] = process.versions.node.split('.').map(Number);
if (!((major === 20 && minor >= 19) || (major === 22 && minor >= 12) || major > 22)) {
  fail(`Faintward needs Node.js 20.19 or later of the 20 series, or 22.12 or newer; this is ${process.versions.node}.`);
}

const lockHash = createHash('sha256').update(readFileSync('package-lock.json')).digest('hex');
const stamp = path.join('node_modules', '.faintward-lock');
if (!existsSync(stamp) || readFileSync(stamp, 'utf8') !== lockHash) {
  console.log('Installing dependencies from package-lock.json ...');
  npm(['ci', '--no-audit', '--no-fund', '--loglevel=error']);
  writeFileSync(stamp, lockHash);
}

if (process.argv.includes('--browser')) findOrInstallChromium();
if (!process.argv.includes('--no-build')) npm(['run', '--silent', 'build']);

/** npm is run through its own JavaScript file where npm tells it, which also works where `npm` is not on the PATH. */
function npm(args) {
  const npmCli = process.env['npm_execpath'];
  const result = npmCli
    ? spawnSync(process.execPath, [npmCli, ...args], { stdio: 'inherit' })
    : spawnSync('npm', args, { stdio: 'inherit', shell: process.platform === 'win32' });
  if (result.status !== 0) fail(`npm ${args.join(' ')} failed.`);
}

function findOrInstallChromium() {
  const candidates = [
    process.env['CHROMIUM_PATH'],
    '/usr/bin/chromium',
    '/usr/bin/chromium-browser',
    '/usr/bin/google-chrome',
  ];
  if (candidates.some((file) => file && existsSync(file))) return;
  const isRoot = process.getuid?.() === 0;
  if (isRoot && existsSync('/usr/bin/apt-get')) {
    console.log('Chromium is missing: installing it from the distribution for the end-to-end tests ...');
    const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
    spawnSync('apt-get', ['update', '-qq'], { stdio: 'inherit', env });
    const result = spawnSync('apt-get', ['install', '-y', '-qq', '--no-install-recommends', 'chromium'], {
      stdio: 'inherit',
      env,
    });
    if (result.status === 0 && existsSync('/usr/bin/chromium')) return;
  }
  fail(
    'The end-to-end tests need Chromium. Install it (Debian: "apt-get install chromium") or set CHROMIUM_PATH to its executable.',
  );
}

function fail(message) {
  console.error(message);
  process.exit(1);
}
