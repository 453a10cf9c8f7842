import { useEffect } from 'react';
import { useSearchParams } from 'react-router-dom';
import { useDebounced } from './useDebounced';

/**
 * The state as it was when nothing had changed for `delayMs`, which from then on stands in the address of the page: a link
 * opens the page as it is. `write` has to be the same function at every rendering.
 */
export function useKeptInAddress<State>(
  state: State,
  write: (state: State) => URLSearchParams,
  delayMs: number,
): State {
  const [, setAddress] = useSearchParams();
  const settled = useDebounced(state, delayMs);
  useEffect(() => {
    setAddress(write(settled), { replace: true });
  }, [settled, write, setAddress]);
  return settled;
}
