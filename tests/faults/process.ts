import { type ChildProcess, spawn } from 'node:child_process';
import { existsSync } from 'node:fs';
import net from 'node:net';
import path from 'node:path';
import process from 'node:process';

const root = path.resolve(import.meta.dirname, '../..');

export interface RunningServer {
  readonly child: ChildProcess;
  readonly address: string;
  /** Sends the signal and waits for the end; the exit code, or the signal that ended it. */
  end(signal: NodeJS.Signals): Promise<number | NodeJS.Signals | null>;
}

/** Everything a program printed and how it ended. */
export interface Finished {
  code: number | null;
  output: string;
}

function start(script: string, parameters: string[], environment: Record<string, string>): ChildProcess {
  const file = path.join(root, 'apps/api/dist', script);
  if (!existsSync(file)) throw new Error('These tests run the built application: run "npm run build" first.');
  const { PATH, HOME } = process.env;
  return spawn(process.execPath, ['--enable-source-maps', file, ...parameters], {
    stdio: ['ignore', 'pipe', 'pipe'],
    env: { PATH, HOME, DEMO: 'off', RATE_LIMITS: 'off', ...environment },
  });
}

function collect(child: ChildProcess): () => string {
  let output = '';
  for (const stream of [child.stdout, child.stderr])
    stream?.on('data', (chunk: Buffer) => (output += chunk.toString()));
  return () => output;
}

/** Runs a built script of the api to its end. */
export async function runBuilt(
  script: string,
  parameters: string[],
  environment: Record<string, string>,
): Promise<Finished> {
  const child = start(script, parameters, environment);
  const output = collect(child);
  const code = await new Promise<number | null>((resolve) => child.once('close', resolve));
  return { code, output: output() };
}

/** Starts the built application and waits until it is ready. */
export async function startServer(environment: Record<string, string>): Promise<RunningServer> {
  const port = await freePort();
  const child = start('main.js', [], { PORT: String(port), ...environment });
  const output = collect(child);
  const ended = new Promise<number | NodeJS.Signals | null>((resolve) =>
    child.once('close', (code, signal) => resolve(code ?? signal)),
  );
  const address = `http://127.0.0.1:${port}`;
  const deadline = Date.now() + 90_000;
  for (;;) {
    if (child.exitCode !== null) throw new Error(`The server ended at its start:\n${output()}`);
    if (Date.now() > deadline) throw new Error(`The server was not ready in time:\n${output()}`);
    const isReady = await fetch(`${address}/api/v1/health/ready`).then(
      (response) => response.ok,
      () => false,
    );
    if (isReady) break;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  return {
    child,
    address,
    end: (signal) => {
      child.kill(signal);
      return ended;
    },
  };
}

function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const server = net.createServer();
    server.once('error', reject);
    server.listen(0, '127.0.0.1', () => {
      const { port } = server.address() as net.AddressInfo;
      server.close(() => resolve(port));
    });
  });
}
