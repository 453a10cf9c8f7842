import { lazy, Suspense, useSyncExternalStore } from 'react';
import { sessionEnded } from '../lib/session';

const SignInAgainDialog = lazy(async () => ({ default: (await import('./SignInAgainDialog')).SignInAgainDialog }));

/** Asks an expired person to sign in again on top of the page; what was typed stays, and what was refused is sent again. */
export function SignInAgain({ email }: { email?: string | undefined }) {
  const open = useSyncExternalStore(sessionEnded.subscribe, sessionEnded.current);
  return open ? (
    <Suspense fallback={null}>
      <SignInAgainDialog email={email ?? ''} />
    </Suspense>
  ) : null;
}
