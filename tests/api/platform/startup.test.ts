import http from 'node:http';
import { mkdirSync, writeFileSync } from 'node:fs';
import net, { type AddressInfo } from 'node:net';
import { describe, expect, it } from 'vitest';
import { finishRequests } from '../../../apps/api/src/platform/finish-requests.js';
import { toDomainError } from '../../../apps/api/src/platform/problem.filter.js';
import { explain } from '../../../apps/api/src/startup.js';

function failureOf(work: () => void): unknown {
  try {
    work();
  } catch (error) {
    return error;
  }
  throw new Error('This was meant to fail.');
}

describe('a failed start', () => {
  it('tells the operator which file cannot be used and why, without a stack', () => {
    for (const error of [
      failureOf(() => mkdirSync('/dev/null/folder')),
      failureOf(() => writeFileSync('/dev', '')),
      failureOf(() => mkdirSync('/dev/null')),
    ]) {
      expect(explain(error)).toMatch(/^\/dev\S* cannot be read or written: .+ DATA_DIR names the folder/);
      expect(explain(error)).not.toMatch(/^\s+at /m);
    }
  });

  it('tells apart a taken port, a foreign address and an absent database server', async () => {
    const listen = (host: string, port: number) =>
      new Promise<unknown>((resolve) => net.createServer().once('error', resolve).listen(port, host));
    const taken = net.createServer();
    await new Promise<void>((resolve) => taken.listen(0, '127.0.0.1', resolve));
    const { port } = taken.address() as AddressInfo;
    expect(explain(await listen('127.0.0.1', port))).toContain(`Port ${port} on 127.0.0.1 is taken.`);
    taken.close();
    // An address of the documentation range (RFC 5737), which no machine has.
    expect(explain(await listen('192.0.2.1', 0))).toContain('192.0.2.1 is no address of this machine');
    const refused = await new Promise<unknown>((resolve) => net.connect(port, '127.0.0.1').once('error', resolve));
    expect(explain(refused)).toBe('The database server of DATABASE_URL cannot be reached.');
  });

  it('keeps the stack of what is no fault of the operator', () => {
    expect(explain(new TypeError('unforeseen'))).toMatch(/unforeseen\n\s+at /);
  });
});

describe('a lost connection to the database', () => {
  it('is a matter of waiting, for the person, whatever form the driver gives it', () => {
    for (const error of [
      Object.assign(new Error('connect'), { code: 'ECONNREFUSED' }),
      new Error('Failed query: select', { cause: Object.assign(new Error('read'), { code: 'ECONNRESET' }) }),
      new Error('Connection terminated unexpectedly'),
      new Error('timeout exceeded when trying to connect'),
    ]) {
      expect(toDomainError(error)).toMatchObject({ code: 'unavailable', details: { retryAfterSeconds: 5 } });
    }
  });
});

describe('the end of the server', () => {
  async function startedServer(answerAfterMs: number) {
    const server = http.createServer((_request, response) => {
      setTimeout(() => response.end('whole'), answerAfterMs);
    });
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
    return { server, address: `http://127.0.0.1:${(server.address() as AddressInfo).port}` };
  }

  it('waits for running requests, and not for connections that are only kept open', async () => {
    const { server, address } = await startedServer(300);
    const running = fetch(address).then((response) => response.text());
    await new Promise((resolve) => server.once('request', resolve));
    const startedAt = performance.now();
    await finishRequests(server, 60_000);
    expect(await running).toBe('whole');
    // Well below the five seconds for which the server keeps an idle connection.
    expect(performance.now() - startedAt).toBeLessThan(4000);
    await expect(fetch(address)).rejects.toThrow();
  });

  it('cuts off a request that does not end', async () => {
    const { server, address } = await startedServer(600_000);
    const running = fetch(address).then(
      () => 'answered',
      () => 'cut off',
    );
    await new Promise((resolve) => server.once('request', resolve));
    await finishRequests(server, 100);
    expect(await running).toBe('cut off');
  });
});
