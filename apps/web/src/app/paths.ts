/** Every address of the application: the pattern for the route table, and a function that makes the link. */
export interface PathOf<Parameters extends unknown[]> {
  pattern: string;
  to: (...parameters: Parameters) => string;
}

const fixed = (pattern: string): PathOf<[]> => ({ pattern, to: () => pattern });

export type ProposalSectionPath =
  'targets' | 'exposures' | 'time' | 'case' | 'team' | 'submit' | 'history' | 'cosmologies';

export const paths = {
  front: fixed('/'),
  signIn: {
    pattern: '/sign-in',
    /** `next` is where to go afterwards, within the application. */
    to: (next?: string) => (next ? `/sign-in?next=${encodeURIComponent(next)}` : '/sign-in'),
  },
  signUp: fixed('/sign-up'),
  forgottenPassword: fixed('/forgotten-password'),
  resetPassword: { pattern: '/password-reset/:token', to: (token: string) => `/password-reset/${token}` },
  profile: fixed('/profile'),
  mailbox: fixed('/mailbox'),
  distances: fixed('/calculators/distances'),
  source: fixed('/calculators/source'),
  exposure: fixed('/calculators/exposure'),
  sources: fixed('/sources'),
  proposals: fixed('/proposals'),
  newProposal: fixed('/proposals/new'),
  proposal: { pattern: '/proposals/:proposalId', to: (proposalId: string) => `/proposals/${proposalId}` },
  /** Sections are children of `proposal`; the pattern is relative to it. */
  proposalSection: {
    pattern: ':section',
    to: (proposalId: string, section: ProposalSectionPath) => `/proposals/${proposalId}/${section}`,
  },
  target: {
    pattern: '/proposals/:proposalId/targets/:targetId',
    to: (proposalId: string, targetId: string) => `/proposals/${proposalId}/targets/${targetId}`,
  },
  reviews: fixed('/reviews'),
  review: { pattern: '/reviews/:proposalId', to: (proposalId: string) => `/reviews/${proposalId}` },
  panel: { pattern: '/panels/:panelId', to: (panelId: string) => `/panels/${panelId}` },
  ranking: { pattern: '/panels/:panelId/ranking', to: (panelId: string) => `/panels/${panelId}/ranking` },
  panels: fixed('/panels'),
  instruments: fixed('/instruments'),
  newConfiguration: {
    pattern: '/instruments/modes/:modeId/new-configuration',
    to: (modeId: string) => `/instruments/modes/${modeId}/new-configuration`,
  },
  semesters: fixed('/semesters'),
  newSemester: fixed('/semesters/new'),
  semesterEdit: {
    pattern: '/semesters/:semesterId/edit',
    to: (semesterId: string) => `/semesters/${semesterId}/edit`,
  },
  semester: { pattern: '/semesters/:semesterId', to: (semesterId: string) => `/semesters/${semesterId}` },
  administration: fixed('/administration'),
  administrationPeople: fixed('/administration/people'),
  administrationMail: fixed('/administration/mail'),
  administrationChanges: fixed('/administration/changes'),
} satisfies Record<string, PathOf<never[]>>;

/** Only addresses of this application: a `next` from elsewhere must not lead people away. */
export function safeNext(next: string | null): string | undefined {
  return next && /^\/(?![/\\])/.test(next) ? next : undefined;
}
