import { sql, type SQL } from 'drizzle-orm';
import { conflicts } from '../../database/schema/assignments.js';
import { proposalMembers, proposals } from '../../database/schema/proposals.js';

/**
 * Condition on `proposals`: this person has a conflict with the proposal. Being on the team counts even where nobody has
 * stored it yet, and cannot be withdrawn. Every query that shows a committee anything of a proposal carries its negation.
 */
export function isConflicted(personId: SQL): SQL {
  return sql`(exists (select 1 from ${conflicts} where ${conflicts.proposalId} = ${proposals.id}
      and ${conflicts.personId} = ${personId} and ${conflicts.withdrawnAt} is null)
    or exists (select 1 from ${proposalMembers} where ${proposalMembers.proposalId} = ${proposals.id}
      and ${proposalMembers.personId} = ${personId}))`;
}

/** Condition on `proposals`: this person has no conflict with the proposal. */
export function isFreeOfConflict(personId: SQL): SQL {
  return sql`not ${isConflicted(personId)}`;
}
