import type { CheckFinding } from '@faintward/contracts/submissions';
import { CASE_SECTIONS, type ProposalFacts } from '../proposals/proposal-facts.read-model.js';

/** What the rules look at. */
export interface CheckedProposal {
  facts: ProposalFacts;
  panelId: string | null;
  hasPanelsToChoose: boolean;
  abstract: string;
  /** Targets with notices or without an observation. */
  targets: readonly {
    targetId: string;
    name: string;
    notices: readonly { code: string; message: string; field?: string }[];
    nearestDuplicateName: string | null;
    hasObservation: boolean;
  }[];
  infeasible: readonly { targetId: string; targetName: string; modeName: string; reason: string | null }[];
  lacking: readonly { targetId: string; targetName: string; modeName: string; lacking: string | null }[];
  olderConfigurationCount: number;
}

/** Findings of one kind that are listed one by one; the others are counted. */
export const LISTED_COUNT = 20;

type Rule = (proposal: CheckedProposal) => CheckFinding[];

/** Every rule that a submission has to pass, in the order of the chain. */
const RULES: readonly Rule[] = [
  noTargets,
  noBrightness,
  targetNotices,
  duplicates,
  noObservations,
  withoutObservation,
  infeasible,
  lackingEstimate,
  olderConfiguration,
  noHours,
  emptyCase,
  longCase,
  noAbstract,
  unsigned,
  noPanel,
];

export function findingsOf(proposal: CheckedProposal): CheckFinding[] {
  return RULES.flatMap((rule) => rule(proposal));
}

function noTargets({ facts }: CheckedProposal): CheckFinding[] {
  return facts.targetCount > 0
    ? []
    : [{ code: 'noTargets', severity: 'blocking', message: 'There are no targets yet.', section: 'targets' }];
}

/** A target that is observed needs a brightness; one that is kept in the list without observation may do without. */
function noBrightness({ targets }: CheckedProposal): CheckFinding[] {
  return limited(
    targets.filter(({ notices }) => notices.some(({ code }) => code === 'noBrightness')),
    ({ targetId, name, hasObservation }) => ({
      code: 'noBrightness',
      severity: hasObservation ? 'blocking' : 'warning',
      message: `${name} has no brightness.`,
      section: 'targets',
      targetId,
      field: 'light',
    }),
    'targets have no brightness either',
  );
}

const REPEATED_NOTICES = [
  'neverUp',
  'beyondLymanBreak',
  'lineAbsorbed',
  'lineOutsideAtmosphere',
  'lineInGap',
  'typicalLight',
  'lightUnusable',
];

function targetNotices({ targets }: CheckedProposal): CheckFinding[] {
  return REPEATED_NOTICES.flatMap((noticeCode) =>
    limited(
      targets.flatMap(({ targetId, name, notices }) =>
        notices.filter(({ code }) => code === noticeCode).map((notice) => ({ targetId, name, notice })),
      ),
      ({ targetId, name, notice }) => ({
        code: notice.code,
        severity: 'warning',
        message: `${name}: ${notice.message}`,
        section: 'targets',
        targetId,
        ...(notice.field === undefined ? {} : { field: notice.field }),
      }),
      'targets have the same notice',
    ),
  );
}

function duplicates({ targets }: CheckedProposal): CheckFinding[] {
  return limited(
    targets.flatMap((target) => (target.nearestDuplicateName === null ? [] : [target])),
    ({ targetId, name, nearestDuplicateName }) => ({
      code: 'duplicate',
      severity: 'warning',
      message: `${name} is within 2″ of ${nearestDuplicateName}: are they one source?`,
      section: 'targets',
      targetId,
    }),
    'targets share a place with another one',
  );
}

function noObservations({ facts }: CheckedProposal): CheckFinding[] {
  if (facts.targetCount === 0 || facts.observationCount > 0) return [];
  return [
    {
      code: 'noObservations',
      severity: 'blocking',
      message: 'Nothing is planned yet: apply a setup to the targets.',
      section: 'exposures',
    },
  ];
}

function withoutObservation({ facts, targets }: CheckedProposal): CheckFinding[] {
  if (facts.observationCount === 0) return [];
  return limited(
    targets.filter(({ hasObservation }) => !hasObservation),
    ({ targetId, name }) => ({
      code: 'withoutObservation',
      severity: 'warning',
      message: `${name} has no observation and asks for no time.`,
      section: 'exposures',
      targetId,
    }),
    'targets have no observation',
  );
}

function infeasible(proposal: CheckedProposal): CheckFinding[] {
  return limited(
    proposal.infeasible,
    ({ targetId, targetName, modeName, reason }) => ({
      code: 'infeasible',
      severity: 'blocking',
      message: `${targetName} with ${modeName} cannot be done: ${reason ?? 'no reason is known.'}`,
      section: 'exposures',
      targetId,
    }),
    'observations cannot be done',
    proposal.facts.infeasibleCount,
  );
}

function lackingEstimate(proposal: CheckedProposal): CheckFinding[] {
  return limited(
    proposal.lacking,
    ({ targetId, targetName, modeName, lacking }) => ({
      code: 'lackingEstimate',
      severity: 'blocking',
      message: `${targetName} with ${modeName} has no exposure time: ${lacking ?? 'something is lacking.'}`,
      section: 'exposures',
      targetId,
    }),
    'observations have no exposure time',
    proposal.facts.lackingCount,
  );
}

function olderConfiguration({ olderConfigurationCount }: CheckedProposal): CheckFinding[] {
  if (olderConfigurationCount === 0) return [];
  return [
    {
      code: 'olderConfiguration',
      severity: 'warning',
      message:
        `${olderConfigurationCount} of the observations were estimated before their instrument mode was configured anew. ` +
        'Apply the setup again to see today’s numbers.',
      section: 'exposures',
    },
  ];
}

function noHours({ facts }: CheckedProposal): CheckFinding[] {
  const { dark, grey, bright } = facts.requestedHours;
  if (facts.observationCount === 0 || dark + grey + bright > 0) return [];
  return [
    { code: 'noHours', severity: 'blocking', message: 'The request adds up to no time at all.', section: 'time' },
  ];
}

function emptyCase({ facts }: CheckedProposal): CheckFinding[] {
  return CASE_SECTIONS.filter(({ isRequired, sectionId }) => isRequired && facts.wordCounts[sectionId] === 0).map(
    ({ sectionId, title }) => ({
      code: 'emptySection',
      severity: 'blocking',
      message: `The section “${title}” is empty.`,
      section: 'case',
      field: sectionId,
    }),
  );
}

function longCase({ facts }: CheckedProposal): CheckFinding[] {
  return CASE_SECTIONS.filter(({ sectionId, wordLimit }) => facts.wordCounts[sectionId] > wordLimit).map(
    ({ sectionId, title, wordLimit }) => ({
      code: 'longSection',
      severity: 'blocking',
      message: `The section “${title}” has ${facts.wordCounts[sectionId]} words; at most ${wordLimit} are allowed.`,
      section: 'case',
      field: sectionId,
    }),
  );
}

function noAbstract({ abstract }: CheckedProposal): CheckFinding[] {
  return abstract.trim() !== ''
    ? []
    : [
        {
          code: 'noAbstract',
          severity: 'warning',
          message: 'There is no abstract; reviewers read it first.',
          section: 'submit',
          field: 'abstract',
        },
      ];
}

function unsigned({ facts }: CheckedProposal): CheckFinding[] {
  if (facts.unsignedCount === 0) return [];
  return [
    {
      code: 'unsigned',
      severity: 'warning',
      message: `${facts.unsignedCount} of ${facts.memberCount} on the team ${facts.unsignedCount === 1 ? 'has' : 'have'} not signed yet.`,
      section: 'team',
    },
  ];
}

function noPanel({ panelId, hasPanelsToChoose }: CheckedProposal): CheckFinding[] {
  if (panelId !== null) return [];
  return [
    {
      code: 'noPanel',
      severity: 'blocking',
      message: hasPanelsToChoose
        ? 'No panel is chosen that will read the proposal.'
        : 'This semester has no panel yet that could read the proposal; ask the observatory.',
      section: 'submit',
      field: 'panelId',
    },
  ];
}

/** One finding for each of the first cases, and one for all the others together. */
function limited<Case>(
  cases: readonly Case[],
  toFinding: (of: Case) => CheckFinding,
  othersText: string,
  totalCount = cases.length,
): CheckFinding[] {
  const findings = cases.slice(0, LISTED_COUNT).map(toFinding);
  const [first] = findings;
  const otherCount = totalCount - findings.length;
  if (first === undefined || otherCount <= 0) return findings;
  const { code, severity, section } = first;
  return [...findings, { code, severity, section, message: `${otherCount} more ${othersText}.` }];
}
