import type { Proposal } from '@faintward/contracts/proposals';
import { useOutletContext } from 'react-router-dom';

/** The proposal whose frame is around the section. */
export function useProposal(): Proposal {
  return useOutletContext<Proposal>();
}
