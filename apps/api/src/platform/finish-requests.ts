import type { Server } from 'node:http';

/**
 * Stops listening and resolves once every running request has its answer, or after `patienceMs`, when whoever is still
 * connected is cut off. Connections that are only kept open for a later request are closed at once.
 */
export async function finishRequests(server: Server, patienceMs: number): Promise<void> {
  if (!server.listening) return;
  const hasFinished = new Promise<void>((resolve) => server.close(() => resolve()));
  // A connection becomes idle when its running request is answered, which may be at any moment from here on.
  const sweep = setInterval(() => server.closeIdleConnections(), 50);
  const cut = setTimeout(() => server.closeAllConnections(), patienceMs);
  await hasFinished;
  clearInterval(sweep);
  clearTimeout(cut);
}
