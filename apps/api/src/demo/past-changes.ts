import { daysFrom } from './calendar.js';
import { demoId } from './identifiers.js';
import { randomStream } from './random.js';
import type { ProposalRow, Scenario } from './scenario.js';

export interface PastChange {
  id: string;
  at: Date;
  personId: string | null;
  scope: string;
  scopeId: string;
  subject: string;
  subjectId: string;
  subjectName: string;
  action: string;
  details: Record<string, { before: unknown; after: unknown }>;
}

/** Corrections that co-investigators made to the target list of a draft in the last days. */
const CORRECTIONS_PER_DRAFT = 4;

/** What the record of changes holds of the time before the demo was opened: drafts begun, teams signed, lists corrected. */
export function changesOf(scenario: Scenario, now: Date): PastChange[] {
  return scenario.proposals.flatMap((proposal) => {
    const titled = { subject: 'proposal', subjectId: proposal.id, subjectName: proposal.title };
    const principalId = proposal.members.find(({ isPrincipal }) => isPrincipal)?.personId ?? null;
    const of = (
      name: string,
      at: Date,
      personId: string | null,
      change: Pick<PastChange, 'subject' | 'subjectId' | 'subjectName' | 'action'> &
        Partial<Pick<PastChange, 'details'>>,
    ): PastChange => ({
      id: demoId('change', proposal.id, name),
      at,
      personId,
      scope: 'proposal',
      scopeId: proposal.id,
      details: {},
      ...change,
    });
    const names = new Map(
      scenario.people.map(({ id, givenName, familyName }) => [id, `${givenName} ${familyName}`] as const),
    );
    const changes = [
      of('created', proposal.createdAt, principalId, { ...titled, action: 'created' }),
      of('imported', daysFrom(proposal.createdAt, 0.1), principalId, {
        subject: 'target',
        subjectId: proposal.id,
        subjectName: `${proposal.targets.length} targets`,
        action: 'imported',
        details: {
          importedCount: { before: null, after: proposal.targets.length },
          skippedFaultyCount: { before: null, after: 0 },
          skippedDuplicateCount: { before: null, after: 0 },
        },
      }),
      ...proposal.members.flatMap(({ id, personId, isPrincipal, signedAt }) =>
        isPrincipal || signedAt === null
          ? []
          : [
              of(`signed ${id}`, signedAt, personId, {
                subject: 'member',
                subjectId: id,
                subjectName: names.get(personId) ?? '',
                action: 'signed',
                details: { signedAt: { before: null, after: signedAt.toISOString() } },
              }),
            ],
      ),
      ...correctionsOf(proposal, now).map(({ name, at, personId, targetId, targetName, details }) =>
        of(name, at, personId, {
          subject: 'target',
          subjectId: targetId,
          subjectName: targetName,
          action: 'changed',
          details,
        }),
      ),
    ];
    if (proposal.fate === 'withdrawn' && proposal.submittedAt !== null) {
      changes.push(
        of('withdrawn', daysFrom(proposal.submittedAt, 9), principalId, {
          ...titled,
          action: 'withdrawn',
          details: { state: { before: 'submitted', after: 'withdrawn' } },
        }),
      );
    }
    return changes;
  });
}

/** The value after a correction is the one in the list today. */
function correctionsOf(proposal: ProposalRow, now: Date) {
  if (proposal.fate !== 'draft') return [];
  const random = randomStream(`corrections of ${proposal.key}`);
  const editors = proposal.members.filter(({ isPrincipal, access }) => !isPrincipal && access !== 'reads');
  const known = proposal.targets.filter(({ light }) => light !== null);
  if (editors.length === 0 || known.length === 0) return [];
  return Array.from({ length: CORRECTIONS_PER_DRAFT }, (_, index) => {
    const editor = index === 0 ? editors[0] : random.pick(editors);
    const target = random.pick(known);
    const { light, redshift } = target;
    const isOfLight = light?.kind === 'apparentMagnitude' && random.next() < 0.5;
    const details: PastChange['details'] = isOfLight
      ? {
          light: {
            before: { ...light, magnitude: Number((light.magnitude + random.between(0.1, 0.5)).toFixed(2)) },
            after: light,
          },
        }
      : { redshift: { before: Number((redshift - random.between(0.002, 0.03)).toFixed(3)), after: redshift } };
    return {
      name: `correction ${index}`,
      at: daysFrom(now, -0.08 - index * random.between(0.3, 0.9)),
      personId: editor?.personId ?? null,
      targetId: target.targetId,
      targetName: target.name,
      details,
    };
  });
}
