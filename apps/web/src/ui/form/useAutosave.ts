import { useCallback, useEffect, useRef, useState } from 'react';

export type SaveState =
  | { kind: 'idle' }
  | { kind: 'waiting' }
  | { kind: 'saving' }
  | { kind: 'saved'; at: number }
  | { kind: 'failed'; error: unknown };

export interface AutosaveOptions<Value> {
  /** Stores a value; called with one value at a time, never twice at once. */
  save: (value: Value) => Promise<unknown>;
  delayMs?: number;
}

/**
 * Saves what is typed a moment after the last change. A change during a save is saved after it; a failed save keeps its
 * value, is tried again when the connection returns, with the next change, or by `retry`.
 */
export function useAutosave<Value>({ save, delayMs = 1000 }: AutosaveOptions<Value>): {
  state: SaveState;
  /** True while something typed is not yet stored: for `LeaveGuard`. */
  hasUnsaved: boolean;
  change: (value: Value) => void;
  /** Saves at once what waits; resolves when nothing is left to save, or the save failed. */
  flush: () => Promise<void>;
  retry: () => void;
} {
  const [state, setState] = useState<SaveState>({ kind: 'idle' });
  const pending = useRef<{ value: Value } | undefined>(undefined);
  const running = useRef<Promise<void> | undefined>(undefined);
  const timer = useRef<ReturnType<typeof setTimeout> | undefined>(undefined);
  const latestSave = useRef(save);
  useEffect(() => {
    latestSave.current = save;
  }, [save]);

  const flush = useCallback((): Promise<void> => {
    clearTimeout(timer.current);
    running.current ??= (async () => {
      while (pending.current) {
        const current = pending.current;
        pending.current = undefined;
        setState({ kind: 'saving' });
        try {
          await latestSave.current(current.value);
          setState({ kind: 'saved', at: Date.now() });
        } catch (error) {
          // Shown by SaveStatus. Kept, unless something newer has been typed meanwhile.
          pending.current ??= current;
          setState({ kind: 'failed', error });
          return;
        }
      }
    })().finally(() => {
      running.current = undefined;
    });
    return running.current;
  }, []);

  const change = useCallback(
    (value: Value) => {
      pending.current = { value };
      setState((old) => (old.kind === 'saving' ? old : { kind: 'waiting' }));
      clearTimeout(timer.current);
      timer.current = setTimeout(() => void flush(), delayMs);
    },
    [flush, delayMs],
  );

  useEffect(() => {
    const again = () => void flush();
    window.addEventListener('online', again);
    return () => {
      window.removeEventListener('online', again);
      // Leaving the page: what waits is sent now rather than never.
      void flush();
    };
  }, [flush]);

  return {
    state,
    hasUnsaved: state.kind === 'waiting' || state.kind === 'saving' || state.kind === 'failed',
    change,
    flush,
    retry: () => void flush(),
  };
}
