/**
 * What happens when the server no longer knows the person. The short-lived access cookie is renewed without a word,
 * once, however many requests and tabs need it; when that fails, whoever had signed in is asked to sign in again on top
 * of the page, and the requests that were refused wait and are sent again. What was typed stays where it is.
 */
const refreshedAtKey = 'faintward-session-refreshed-at';

let refreshing: Promise<boolean> | undefined;

/**
 * Renews the session. True when requests may be tried again.
 * @param refusedRequestSentAt milliseconds since 1970 at which the refused request was sent: a renewal after that, by
 *   another request or another tab, makes a further one unnecessary (the refresh token is used only once).
 */
export function refreshSession(refusedRequestSentAt: number): Promise<boolean> {
  refreshing ??= withLock(async () => {
    if (lastRefreshedAt() > refusedRequestSentAt) return true;
    const response = await fetch('/api/v1/session/refresh', { method: 'POST', credentials: 'same-origin' }).catch(
      () => undefined,
    );
    if (!response?.ok) return false;
    rememberRefresh();
    return true;
  }).finally(() => {
    refreshing = undefined;
  });
  return refreshing;
}

function withLock(work: () => Promise<boolean>): Promise<boolean> {
  // Without the lock manager (an insecure origin) two tabs may renew at once; the server then ends one of the two.
  if (!('locks' in navigator)) return work();
  return navigator.locks.request('faintward-session-refresh', work);
}

function lastRefreshedAt(): number {
  try {
    return Number(localStorage.getItem(refreshedAtKey) ?? 0);
  } catch {
    // Storage is forbidden: then every tab renews for itself.
    return 0;
  }
}

function rememberRefresh(): void {
  try {
    localStorage.setItem(refreshedAtKey, String(Date.now()));
  } catch {
    // As above.
    return;
  }
}

let hadPerson = false;
let waiting: ((signedIn: boolean) => void)[] = [];
const listeners = new Set<() => void>();

const notify = () => {
  for (const listener of listeners) listener();
};

/** Tells whether this tab shows pages of a signed-in person: only then is anybody asked to sign in again. */
export function setHadPerson(value: boolean): void {
  hadPerson = value;
}

/** True while requests wait for the person to sign in again. For `useSyncExternalStore`. */
export const sessionEnded = {
  subscribe(listener: () => void): () => void {
    listeners.add(listener);
    return () => listeners.delete(listener);
  },
  current: (): boolean => waiting.length > 0,
};

/** Waits until the person has signed in again (true) or has declined to (false; at once when nobody was signed in). */
export function waitForSignIn(signal?: AbortSignal): Promise<boolean> {
  if (!hadPerson || signal?.aborted) return Promise.resolve(false);
  return new Promise((resolve) => {
    const settle = (signedIn: boolean) => {
      signal?.removeEventListener('abort', onAbort);
      resolve(signedIn);
    };
    const onAbort = () => {
      waiting = waiting.filter((other) => other !== settle);
      notify();
      settle(false);
    };
    signal?.addEventListener('abort', onAbort);
    waiting.push(settle);
    notify();
  });
}

/** Called by the dialog: everything that waits goes on. */
export function settleSignIn(signedIn: boolean): void {
  const settled = waiting;
  waiting = [];
  if (!signedIn) hadPerson = false;
  else rememberRefresh();
  notify();
  for (const settle of settled) settle(signedIn);
}
