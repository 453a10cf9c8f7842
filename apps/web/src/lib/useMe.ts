import type { Me } from '@faintward/contracts/accounts';
import { useQuery } from '@tanstack/react-query';
import { sessionQueries } from './queries/session';

/** The signed-in person on pages behind `RequirePerson`. @throws when there is none: the page is misplaced in the route table. */
export function useMe(): Me {
  const me = useQuery(sessionQueries.me()).data;
  if (!me) throw new Error('useMe belongs on pages behind RequirePerson');
  return me;
}
