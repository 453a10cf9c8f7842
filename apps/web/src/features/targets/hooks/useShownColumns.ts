import { useCallback, useState } from 'react';
import { z } from 'zod';

const Stored = z.record(z.string(), z.boolean());

/** Which columns are shown, remembered in this browser. */
export function useShownColumns(storageKey: string, hiddenAtFirst: readonly string[]) {
  const [model, setModel] = useState<Record<string, boolean>>(() => ({
    ...Object.fromEntries(hiddenAtFirst.map((field) => [field, false])),
    ...read(storageKey),
  }));
  const change = useCallback(
    (next: Record<string, boolean>) => {
      setModel(next);
      try {
        localStorage.setItem(storageKey, JSON.stringify(next));
      } catch (error) {
        // Storage may be full or forbidden: the choice then lasts as long as the page.
        console.warn('The choice of columns could not be remembered.', error);
      }
    },
    [storageKey],
  );
  return [model, change] as const;
}

function read(storageKey: string): Record<string, boolean> {
  try {
    const stored = Stored.safeParse(JSON.parse(localStorage.getItem(storageKey) ?? '{}'));
    return stored.success ? stored.data : {};
  } catch (error) {
    console.warn('The choice of columns could not be read.', error);
    return {};
  }
}
