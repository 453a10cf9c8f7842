import { beforeAll, describe, expect, it } from 'vitest';
import type { Criterion, HoursByMoonClass } from '@faintward/contracts';
import { spearmanRho } from '@faintward/ranking';
import { assignReviewers, writeReviews } from '../../../apps/api/src/demo/committee.js';
import { type DemoData, readDemoData } from '../../../apps/api/src/demo/demo-data.js';
import { type Contender, decide, leniencyOf, opinionOf } from '../../../apps/api/src/demo/opinions.js';
import { randomStream } from '../../../apps/api/src/demo/random.js';
import { buildScenario, type Scenario } from '../../../apps/api/src/demo/scenario.js';

const NOW = new Date('2027-05-20T09:30:00Z');

describe('opinions of the demo’s reviewers', () => {
  let data: DemoData;
  let criteria: Criterion[];
  beforeAll(async () => {
    data = await readDemoData();
    ({ criteria } = data.semesters);
  });

  it('are half steps from 0 to 10, with a comment, on every criterion', () => {
    for (let index = 0; index < 300; index += 1) {
      const opinion = opinionOf(
        index % 11,
        `proposal ${index}`,
        `reviewer ${index % 9}`,
        criteria,
        data.comments,
        'complete',
      );
      expect(Object.keys(opinion.answers ?? {})).toEqual(criteria.map(({ criterionId }) => criterionId));
      expect(opinion.commentToPrincipal?.length).toBeGreaterThan(30);
      for (const answer of Object.values(opinion.answers ?? {})) {
        if (answer?.kind !== 'score') continue;
        expect(answer.score).toBeGreaterThanOrEqual(0);
        expect(answer.score).toBeLessThanOrEqual(10);
        expect(Number.isInteger(2 * answer.score)).toBe(true);
      }
    }
  });

  it('follow the quality of a proposal, and shift with the leniency of the reviewer', () => {
    const qualities = Array.from({ length: 60 }, (_, index) => 3 + index / 10);
    const firstScore = (quality: number, reviewer: string) => {
      const [answer] = Object.values(
        opinionOf(quality, `proposal of ${quality}`, reviewer, criteria, data.comments, 'complete').answers ?? {},
      );
      return answer?.kind === 'score' ? answer.score : 0;
    };
    const scores = qualities.map((quality) => firstScore(quality, 'a reviewer'));
    expect(spearmanRho(qualities, scores)).toBeGreaterThan(0.7);
    const reviewers = Array.from({ length: 12 }, (_, index) => `reviewer ${index}`);
    const means = reviewers.map(
      (reviewer) => qualities.reduce((sum, quality) => sum + firstScore(quality, reviewer), 0) / qualities.length,
    );
    expect(spearmanRho(reviewers.map(leniencyOf), means)).toBeGreaterThan(0.9);
  });
});

describe('assignments and reviews of the demo', () => {
  let data: DemoData;
  let scenario: Scenario;
  beforeAll(async () => {
    data = await readDemoData();
    scenario = buildScenario(data, NOW);
  });

  function panelOf(name: string) {
    const semester = scenario.semesters.find(({ key }) => key === 'reviewing');
    const panel = scenario.panels.find((candidate) => candidate.semesterKey === 'reviewing' && candidate.name === name);
    if (semester === undefined || panel === undefined) throw new Error('The panel is missing.');
    const proposals = scenario.proposals.filter(({ panelId }) => panelId === panel.id);
    const memberIds = scenario.panelMembers
      .filter(({ panelId }) => panelId === panel.id)
      .map(({ personId }) => personId);
    return { semester, panel, proposals, memberIds };
  }

  it('give each proposal four reviewers and one lead, none of them the chair or in conflict', () => {
    const { semester, panel, proposals, memberIds } = panelOf('Distant galaxies');
    const isConflicted = (proposalId: string, personId: string) =>
      proposals.find(({ id }) => id === proposalId)?.members.some((member) => member.personId === personId) ?? false;
    const assigned = assignReviewers(panel, semester, proposals, memberIds, isConflicted);
    for (const { id } of proposals) {
      const own = assigned.filter(({ proposalId }) => proposalId === id);
      expect(own).toHaveLength(4);
      expect(own.filter(({ isLead }) => isLead)).toHaveLength(1);
    }
    expect(assigned.some(({ personId }) => personId === panel.chairId)).toBe(false);
    expect(assigned.some(({ proposalId, personId }) => isConflicted(proposalId, personId))).toBe(false);
  });

  it('go as far as each reviewer has come, within the time there was', () => {
    const { semester, panel, proposals, memberIds } = panelOf('Distant galaxies');
    const assigned = assignReviewers(panel, semester, proposals, memberIds, () => false);
    const halfWay = memberIds.find((personId) => personId !== panel.chairId);
    const written = writeReviews(
      assigned,
      proposals,
      semester.criteria,
      data.comments,
      (personId) => (personId === halfWay ? 0.5 : 1),
      NOW,
    );
    for (const personId of new Set(assigned.map((assignment) => assignment.personId))) {
      const own = written.filter((review) => review.personId === personId);
      const assignedCount = assigned.filter((assignment) => assignment.personId === personId).length;
      const completeCount = own.filter(({ isComplete }) => isComplete).length;
      expect(completeCount).toBe(personId === halfWay ? Math.round(0.5 * assignedCount) : assignedCount);
      expect(own.length - completeCount).toBeLessThanOrEqual(1);
    }
    for (const { overallScore, updatedAt, createdAt } of written) {
      expect(overallScore).not.toBeNull();
      expect(updatedAt.getTime()).toBeLessThanOrEqual(NOW.getTime());
      expect(createdAt.getTime()).toBeGreaterThan(semester.deadlineAt.getTime());
    }
  });
});

describe('decisions of the demo', () => {
  const available: HoursByMoonClass = { dark: 40, grey: 20, bright: 50 };
  const contenders = Array.from({ length: 40 }, (_, index): Contender => {
    const random = randomStream(`contender ${index}`);
    return {
      proposalId: `proposal ${index}`,
      meanScore: random.between(2, 9),
      requestedHours: {
        dark: index % 3 === 0 ? random.between(2, 20) : 0,
        grey: index % 3 === 1 ? random.between(2, 20) : random.between(0, 1),
        bright: index % 3 === 2 ? random.between(2, 20) : 0,
      },
      acceptsThinCloud: index % 2 === 0,
    };
  });

  it('answer everybody once, and hand out no more than there is, fillers apart', () => {
    const decisions = decide(contenders, available);
    expect(new Set(decisions.map(({ proposalId }) => proposalId)).size).toBe(contenders.length);
    for (const moonClass of ['dark', 'grey', 'bright'] as const) {
      const given = (standings: readonly (string | undefined)[]) =>
        decisions
          .filter((decision) => decision.moonClass === moonClass && standings.includes(decision.standing))
          .reduce((sum, { hours }) => sum + hours, 0);
      expect(given(['firm', 'flexible'])).toBeLessThanOrEqual(available[moonClass]);
      expect(given(['filler'])).toBeLessThanOrEqual(0.15 * available[moonClass]);
    }
    expect(decisions.filter(({ hours }) => hours === 0).every(({ standing }) => standing === undefined)).toBe(true);
    expect(decisions.some(({ standing }) => standing === 'firm')).toBe(true);
    expect(decisions.some(({ standing }) => standing === undefined)).toBe(true);
  });

  it('give the best scored its whole request', () => {
    const best = [...contenders].sort((a, b) => b.meanScore - a.meanScore)[0];
    const decision = decide(contenders, available).find(({ proposalId }) => proposalId === best?.proposalId);
    const { dark = 0, grey = 0, bright = 0 } = best?.requestedHours ?? {};
    expect(decision?.standing).toBe('firm');
    expect(decision?.hours).toBeGreaterThanOrEqual(dark + grey + bright);
    expect(decision?.hours).toBeLessThan(dark + grey + bright + 0.5);
  });

  it('decline everybody when there are no hours', () => {
    const decisions = decide(contenders, { dark: 0, grey: 0, bright: 0 });
    expect(decisions.every(({ hours, standing }) => hours === 0 && standing === undefined)).toBe(true);
  });
});
