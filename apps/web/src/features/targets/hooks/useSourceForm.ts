import { Target, type TargetPatch } from '@faintward/contracts/targets';
import { useCallback, useEffect, useRef, useState } from 'react';
import { ApiError } from '../../../lib/api';
import { useAutosave } from '../../../ui/form/useAutosave';
import { toLightDraft, type LightDraft, type LightErrors } from '../../../ui/light/lightDraft';
import { lightFieldOf, readLightDraft } from '../../../ui/light/readLightDraft';
import {
  readRedshiftDraft,
  redshiftFieldOf,
  toRedshiftDraft,
  type RedshiftDraft,
  type RedshiftErrors,
} from '../../../ui/light/redshiftDraft';
import { usePatchTarget } from '../api/targets';

/** Redshift, light and size as they are typed. */
export interface SourceDraft {
  light: LightDraft;
  redshift: RedshiftDraft;
}

function toSourceDraft(target: Target): SourceDraft {
  return {
    light: toLightDraft(target.light, target.extent),
    redshift: toRedshiftDraft(target.redshift, target.redshiftKind, target.redshiftUncertainty),
  };
}

/** What a draft changes of a target, in the contract's terms; undefined while something in it cannot be read. */
function toSourcePatch(draft: SourceDraft, target: Target): TargetPatch | undefined {
  const light = readLightDraft(draft.light);
  const redshift = readRedshiftDraft(draft.redshift);
  if (!light.ok || !redshift.ok) return undefined;
  const wanted = {
    redshift: redshift.redshift,
    redshiftKind: redshift.redshiftKind,
    redshiftUncertainty: redshift.uncertainty,
    light: light.light,
    extent: light.extent,
  };
  return Object.fromEntries(
    Object.entries(wanted).filter(
      ([name, value]) => JSON.stringify(value) !== JSON.stringify(target[name as keyof typeof wanted]),
    ),
  );
}

/**
 * The form that describes a target's redshift, light and size. It saves by itself, a moment after the last change, only
 * what changed, and against the version last seen; what cannot be read or is refused stays typed.
 */
export function useSourceForm(proposalId: string, target: Target) {
  const { mutateAsync } = usePatchTarget(proposalId);
  const [base, setBase] = useState(target);
  const latestBase = useRef(target);
  const [draft, setDraft] = useState(() => toSourceDraft(target));
  const [opened, setOpened] = useState(draft);
  const [isPostponed, setIsPostponed] = useState(false);

  const latestDraft = useRef(draft);
  useEffect(() => {
    latestBase.current = base;
    latestDraft.current = draft;
  }, [base, draft]);
  const rebase = useCallback((next: Target) => {
    latestBase.current = next;
    setBase(next);
  }, []);
  const autosave = useAutosave<SourceDraft>({
    delayMs: 2000,
    save: async (typed) => {
      const { targetId, version } = latestBase.current;
      const patch = toSourcePatch(typed, latestBase.current);
      if (!patch || Object.keys(patch).length === 0) return;
      setIsPostponed(false);
      rebase(await mutateAsync({ targetId, version, patch }));
    },
  });

  const light = readLightDraft(draft.light);
  const redshift = readRedshiftDraft(draft.redshift);
  const isComplete = light.ok && redshift.ok;
  const hasUnsaved = autosave.hasUnsaved || !isComplete;
  if (target.version > base.version && !hasUnsaved) {
    // Changed elsewhere while nothing is typed here: follow.
    setBase(target);
    setDraft(toSourceDraft(target));
    setOpened(toSourceDraft(target));
  }

  const error = autosave.state.kind === 'failed' ? autosave.state.error : undefined;
  const problem = error instanceof ApiError ? error : undefined;
  const current = problem?.code === 'stale-version' ? Target.safeParse(problem.current).data : undefined;
  const lightErrors: LightErrors = light.ok ? {} : { ...light.errors };
  const redshiftErrors: RedshiftErrors = redshift.ok ? {} : { ...redshift.errors };
  for (const { path, message } of problem?.fieldErrors ?? []) {
    const lightField = lightFieldOf(path, draft.light);
    const redshiftField = redshiftFieldOf(path, draft.redshift);
    if (lightField) lightErrors[lightField] ??= message;
    if (redshiftField) redshiftErrors[redshiftField] ??= message;
  }

  // From the latest draft: what a request brings back may come after something else was typed.
  const change = (update: (old: SourceDraft) => SourceDraft) => {
    const next = update(latestDraft.current);
    latestDraft.current = next;
    setDraft(next);
    autosave.change(next);
  };
  return {
    base,
    draft,
    lightErrors,
    redshiftErrors,
    isComplete,
    hasUnsaved,
    saveState: autosave.state,
    retry: autosave.retry,
    /** Saves at once what waits. */
    flush: autosave.flush,
    changeLight: (part: Partial<LightDraft>) => change((old) => ({ ...old, light: { ...old.light, ...part } })),
    changeRedshift: (part: Partial<RedshiftDraft>) =>
      change((old) => ({ ...old, redshift: { ...old.redshift, ...part } })),
    /** True when it differs from what it was when it was opened. */
    canPutBack: JSON.stringify(draft) !== JSON.stringify(opened),
    putBack: () => change(() => opened),
    /** The target as another person left it, while it is not decided whose stands. */
    conflict: isPostponed ? undefined : current,
    keepMine: () => {
      if (current) rebase(current);
      autosave.retry();
    },
    takeTheirs: () => {
      if (!current) return;
      rebase(current);
      setOpened(toSourceDraft(current));
      change(() => toSourceDraft(current));
      void autosave.flush();
    },
    decideLater: () => setIsPostponed(true),
  };
}
