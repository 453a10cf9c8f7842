import { Target } from '@faintward/contracts/targets';
import { useQueryClient } from '@tanstack/react-query';
import { useCallback, useEffect, useMemo, useRef, useState } from 'react';
import { ApiError } from '../../../lib/api';
import { problemMessage } from '../../../ui/ProblemDisplay';
import { placeTarget, usePatchTarget } from '../api/targets';
import { storedText, type CellName } from '../cells';

/** A cell that holds what was typed and is not stored (yet). */
export interface CellDraft {
  targetId: string;
  targetName: string;
  cell: CellName;
  text: string;
  /** What stood in the cell when it was typed over. */
  before: string;
  /** Of the row, when the cell was opened. */
  version: number;
  state: 'saving' | 'refused' | 'unsent' | 'stale';
  /** Why it is not stored. */
  message: string | undefined;
  /** On `stale`: the target as another person left it. */
  current: Target | undefined;
}

export type Drafts = ReadonlyMap<string, CellDraft>;
export const draftKey = (targetId: string, cell: CellName) => `${targetId} ${cell}`;

/**
 * Saves cells one by one, each against the version last seen of its row. What is refused, or could not be sent, stays
 * in its cell until it is mended, sent again or put back: nothing that was typed is lost.
 */
export function useCellEdits(proposalId: string) {
  const client = useQueryClient();
  const { mutateAsync } = usePatchTarget(proposalId);
  const [drafts, setDrafts] = useState<Drafts>(new Map());
  const latest = useRef<Drafts>(drafts);
  // One save at a time for a row: the second needs the version that the first brings back.
  const queues = useRef(new Map<string, Promise<void>>());
  // Which version of a row each of one's own saves turned into which: what was opened before it is not stale after it.
  const advanced = useRef(new Map<string, number>());

  const put = useCallback((key: string, draft: CellDraft | undefined) => {
    const next = new Map(latest.current);
    if (draft) next.set(key, draft);
    else next.delete(key);
    latest.current = next;
    setDrafts(next);
  }, []);

  const save = useCallback(
    async (key: string) => {
      const draft = latest.current.get(key);
      if (draft?.state !== 'saving') return;
      const { targetId, cell, text } = draft;
      const settle = (change: Partial<CellDraft> | undefined) => {
        // Typed over meanwhile: the newer text has its own save behind this one.
        const now = latest.current.get(key);
        if (now !== draft) return;
        put(key, change && { ...now, ...change });
      };
      let { version } = draft;
      for (;;) {
        const next = advanced.current.get(`${targetId} ${version}`);
        if (next === undefined) break;
        version = next;
      }
      try {
        const saved = await mutateAsync({ targetId, version, patch: { cells: { [cell]: text } } });
        if (saved.version > version) advanced.current.set(`${targetId} ${version}`, saved.version);
        settle(undefined);
      } catch (error) {
        settle(failure(error, cell));
      }
    },
    [mutateAsync, put],
  );

  const enqueue = useCallback(
    (key: string, targetId: string) => {
      const queue = (queues.current.get(targetId) ?? Promise.resolve()).then(() => save(key));
      queues.current.set(targetId, queue);
    },
    [save],
  );

  /** The grid has a new text for a cell that was opened when its row had `openedVersion`. */
  const commit = useCallback(
    (target: Target, cell: CellName, text: string, openedVersion = target.version) => {
      const key = draftKey(target.targetId, cell);
      const before = latest.current.get(key)?.before ?? storedText(target, cell);
      if (text === storedText(target, cell)) {
        put(key, undefined);
        return;
      }
      put(key, {
        targetId: target.targetId,
        targetName: target.name,
        cell,
        text,
        before,
        version: openedVersion,
        state: 'saving',
        message: undefined,
        current: undefined,
      });
      enqueue(key, target.targetId);
    },
    [enqueue, put],
  );

  const retry = useCallback(
    (key: string) => {
      const draft = latest.current.get(key);
      if (!draft || draft.state === 'saving') return;
      put(key, { ...draft, state: 'saving', message: undefined });
      enqueue(key, draft.targetId);
    },
    [enqueue, put],
  );

  const discard = useCallback((key: string) => put(key, undefined), [put]);

  /** Answers a stale cell: `mine` is sent again on top of what the other person stored, `theirs` puts the cell back. */
  const resolve = useCallback(
    (key: string, choice: 'mine' | 'theirs') => {
      const draft = latest.current.get(key);
      if (!draft?.current) return;
      placeTarget(client, proposalId, draft.current);
      if (choice === 'theirs') put(key, undefined);
      else {
        const { current } = draft;
        put(key, {
          ...draft,
          before: storedText(current, draft.cell),
          version: current.version,
          state: 'stale',
          current: undefined,
        });
        retry(key);
      }
    },
    [client, proposalId, put, retry],
  );

  const retryUnsent = useCallback(() => {
    for (const [key, draft] of latest.current) if (draft.state === 'unsent') retry(key);
  }, [retry]);

  useEffect(() => {
    window.addEventListener('online', retryUnsent);
    return () => window.removeEventListener('online', retryUnsent);
  }, [retryUnsent]);

  return useMemo(
    () => ({ drafts, hasUnsaved: drafts.size > 0, commit, retry, discard, resolve, retryUnsent }),
    [drafts, commit, retry, discard, resolve, retryUnsent],
  );
}

export type CellEdits = ReturnType<typeof useCellEdits>;

function failure(error: unknown, cell: CellName): Partial<CellDraft> {
  if (error instanceof ApiError) {
    if (error.code === 'stale-version') {
      const current = Target.safeParse(error.current);
      if (current.success) {
        return { state: 'stale', current: current.data, message: 'Another person changed this row meanwhile.' };
      }
    }
    if (error.fieldErrors.length > 0) {
      const own = error.fieldErrors.find((fault) => fault.path === `cells.${cell}`);
      return { state: 'refused', message: own?.message ?? error.fieldErrors.map((fault) => fault.message).join(' ') };
    }
    if (error.code === 'unreachable') {
      return { state: 'unsent', message: 'Offline. It is sent when the connection returns.' };
    }
    if (error.status === 401) return { state: 'unsent', message: 'Signed out. Sign in, then send it again.' };
    if (error.status >= 500) return { state: 'unsent', message: problemMessage(error) };
  }
  return { state: 'refused', message: problemMessage(error) };
}
