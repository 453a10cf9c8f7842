import { z } from 'zod';

/**
 * Named permissions. Those of `staff` and `administrator` hang on the person; all others are decided on the object
 * (this proposal, this panel) in the service that owns it. What a person may not see answers as if it were absent.
 */
export const Permission = z.enum([
  'proposal.create',
  'proposal.read',
  'proposal.edit',
  'proposal.edit-targets',
  'proposal.manage-team',
  'proposal.submit',
  'submission.read',
  'review.read',
  'review.write',
  'panel.read',
  'panel.assign',
  'panel.rank',
  'panel.award',
  'semester.manage',
  'facility.manage',
  'people.search',
  'people.manage',
  'audit.read',
  'mail.read',
]);
export type Permission = z.infer<typeof Permission>;

/** How far a member of a proposal's team may go. The principal investigator always edits everything. */
export const TeamAccess = z.enum(['reads', 'editsTargets', 'editsEverything']);
export type TeamAccess = z.infer<typeof TeamAccess>;

export const PanelRole = z.enum(['member', 'chair']);
export type PanelRole = z.infer<typeof PanelRole>;
