import { redshiftDistribution } from '@faintward/photometry';
import { uncertaintyFaults } from '../../../apps/api/src/engine/redshift-faults.js';
import { beforeAll, describe, expect, it } from 'vitest';
import { angularSeparationDeg } from '@faintward/astronomy';
import { ModeConfigurationInput, TargetInput } from '@faintward/contracts';
import { daysFrom, semesterDates } from '../../../apps/api/src/demo/calendar.js';
import { type DemoData, readDemoData } from '../../../apps/api/src/demo/demo-data.js';
import { demoId } from '../../../apps/api/src/demo/identifiers.js';
import { randomStream } from '../../../apps/api/src/demo/random.js';
import { buildScenario, type Scenario } from '../../../apps/api/src/demo/scenario.js';
import { galacticLatitudeDeg } from '../../../apps/api/src/demo/target-lists.js';

const NOW = new Date('2027-05-20T09:30:00Z');
const OTHER_DAYS = ['2026-12-01T12:00:00Z', '2027-01-31T23:59:00Z', '2028-02-29T00:00:00Z', '2030-08-15T06:00:00Z'];

describe('the demo scenario', () => {
  let data: DemoData;
  let scenario: Scenario;
  beforeAll(async () => {
    data = await readDemoData();
    scenario = buildScenario(data, NOW);
  });

  it('has the size of a working observatory', () => {
    expect(scenario.partners).toHaveLength(4);
    expect(scenario.partners.reduce((sum, { shareFraction }) => sum + shareFraction, 0)).toBeCloseTo(1, 10);
    expect(scenario.institutions).toHaveLength(16);
    expect(scenario.people).toHaveLength(52);
    expect(scenario.semesters).toHaveLength(3);
    expect(scenario.panels).toHaveLength(9);
    expect(scenario.proposals).toHaveLength(63);
    const targetCounts = scenario.proposals.map(({ targets }) => targets.length);
    expect(Math.max(...targetCounts)).toBe(1200);
    const others = targetCounts.reduce((sum, count) => sum + count, 0) - 1200;
    expect(others).toBeGreaterThanOrEqual(300);
    expect(others).toBeLessThanOrEqual(700);
  });

  it('is the same whenever it is built for the same moment', async () => {
    expect(buildScenario(await readDemoData(), new Date(NOW))).toEqual(scenario);
  });

  it('keeps its identifiers and moves its sky with the day', () => {
    const later = buildScenario(data, daysFrom(NOW, 95));
    expect(later.proposals.map(({ id }) => id)).toEqual(scenario.proposals.map(({ id }) => id));
    expect(later.people.map(({ id }) => id)).toEqual(scenario.people.map(({ id }) => id));
    for (const [index, { targets }] of later.proposals.entries()) {
      const before = scenario.proposals[index]?.targets ?? [];
      expect(targets.map(({ redshift, light, extent }) => ({ redshift, light, extent }))).toEqual(
        before.map(({ redshift, light, extent }) => ({ redshift, light, extent })),
      );
      expect(targets.map(({ rightAscensionDeg }) => rightAscensionDeg)).not.toEqual(
        before.map(({ rightAscensionDeg }) => rightAscensionDeg),
      );
    }
  });

  it('names nothing twice', () => {
    const ids = [
      ...scenario.people.map(({ id }) => id),
      ...scenario.modes.map(({ id }) => id),
      ...scenario.proposals.flatMap((proposal) => [
        proposal.id,
        ...proposal.members.map(({ id }) => id),
        ...proposal.targets.map(({ targetId }) => targetId),
        ...proposal.observations.map(({ id }) => id),
      ]),
    ];
    expect(new Set(ids).size).toBe(ids.length);
    expect(new Set(scenario.people.map(({ email }) => email)).size).toBe(scenario.people.length);
    for (const { semesterKey, title, key } of scenario.proposals) {
      const same = scenario.proposals.filter((other) => other.semesterKey === semesterKey && other.title === title);
      expect(same, key).toHaveLength(1);
    }
  });

  it('refers only to what is there', () => {
    const personIds = new Set(scenario.people.map(({ id }) => id));
    const institutionIds = new Set(scenario.institutions.map(({ id }) => id));
    const modeIds = new Set(scenario.modes.map(({ id }) => id));
    const panelIds = new Set(scenario.panels.map(({ id }) => id));
    const partnerIds = new Set(scenario.partners.map(({ id }) => id));
    const telescopeIds = new Set(scenario.telescopes.map(({ id }) => id));
    for (const { telescopeId } of scenario.semesterHours) expect(telescopeIds).toContain(telescopeId);
    for (const { institutionId } of scenario.people) expect(institutionIds).toContain(institutionId);
    for (const { panelId, personId } of scenario.panelMembers) {
      expect(panelIds).toContain(panelId);
      expect(personIds).toContain(personId);
    }
    for (const proposal of scenario.proposals) {
      expect(panelIds, proposal.key).toContain(proposal.panelId);
      if (proposal.partnerId !== null) expect(partnerIds, proposal.key).toContain(proposal.partnerId);
      expect(proposal.members.filter(({ isPrincipal }) => isPrincipal)).toHaveLength(1);
      expect(new Set(proposal.members.map(({ personId }) => personId)).size).toBe(proposal.members.length);
      for (const { personId } of proposal.members) expect(personIds, proposal.key).toContain(personId);
      const targetIds = new Set(proposal.targets.map(({ targetId }) => targetId));
      for (const observation of proposal.observations) {
        expect(targetIds, proposal.key).toContain(observation.targetId);
        expect(modeIds, proposal.key).toContain(observation.modeId);
      }
    }
  });

  it('holds only what a person could have typed', () => {
    for (const { configuration, modeId } of scenario.modeConfigurations) {
      expect(() => ModeConfigurationInput.parse(configuration), modeId).not.toThrow();
    }
    for (const { key, targets } of scenario.proposals) {
      for (const { targetId: _id, proposalKey: _key, groupIndex: _group, position: _position, ...input } of targets) {
        expect(TargetInput.safeParse(input).error, `${key} ${input.name}`).toBeUndefined();
      }
    }
  });

  it('knows its sources in every way that the contract has words for', () => {
    const all = scenario.proposals.flatMap(({ targets }) => targets);
    const lights = all.flatMap(({ light }) => (light === null ? [] : [light]));
    const kindsOf = (values: readonly { kind: string }[]) => new Set(values.map(({ kind }) => kind));
    expect(kindsOf(lights)).toEqual(new Set(['apparentMagnitude', 'absoluteMagnitude', 'lineFlux', 'typical']));
    expect(kindsOf(lights.flatMap((light) => ('spectrum' in light ? [light.spectrum] : [])))).toEqual(
      new Set(['powerLaw', 'starForming', 'passive', 'quasar', 'supernovaIa', 'blackbody', 'uploaded']),
    );
    expect(
      kindsOf(all.flatMap(({ redshiftUncertainty }) => (redshiftUncertainty === null ? [] : [redshiftUncertainty]))),
    ).toEqual(new Set(['gaussian', 'percentiles', 'table']));
    const lensed = lights.filter(({ magnification }) => magnification !== 1);
    expect(lensed.every(({ sigmaLnMagnification }) => (sigmaLnMagnification ?? 0) > 0)).toBe(true);
    expect(new Set(lensed.map(({ includes }) => includes.lensing))).toEqual(new Set([true, false]));
    for (const target of all) expect(uncertaintyFaults(target), target.name).toEqual([]);
  });

  it('gives two redshifts to a galaxy that may be a nearer one', () => {
    const [target] = scenario.proposals.find(({ key }) => key === 'V02')?.targets ?? [];
    const peaks = redshiftDistribution(target?.redshift ?? 0, target?.redshiftUncertainty ?? null).peaks;
    expect(peaks).toHaveLength(2);
    expect(peaks[0]?.redshift).toBeCloseTo(target?.redshift ?? 0, 1);
    expect(peaks[1]?.redshift).toBeCloseTo(3.3, 1);
    // Its recipe says between 12 and 30 per cent; the table ends at four standard deviations.
    expect(peaks[1]?.probability).toBeGreaterThan(0.11);
    expect(peaks[1]?.probability).toBeLessThan(0.31);
  });

  it('gives its targets names of its own, made from where they are', () => {
    const own = /^CLR[QEATHC]? J\d{6}\.\d[+-]\d{6}$/;
    for (const { key, targets } of scenario.proposals) {
      expect(new Set(targets.map(({ name }) => name)).size, key).toBe(targets.length);
      for (const { name, rightAscensionDeg } of targets) {
        expect(name).toMatch(own);
        expect(Number(/J(\d\d)/.exec(name)?.[1])).toBe(Math.floor(rightAscensionDeg / 15));
      }
    }
  });

  it.each(OTHER_DAYS)('puts its targets where a southern site sees them, opened at %s', (day) => {
    for (const { key, targets } of buildScenario(data, new Date(day)).proposals) {
      for (const target of targets) {
        expect(target.declinationDeg, key).toBeLessThan(16);
        // A field may reach a little further than its centre.
        expect(Math.abs(galacticLatitudeDeg(target)), `${key} ${target.name}`).toBeGreaterThan(19);
      }
    }
  });

  it('finds the galactic pole and the galactic centre where they are', () => {
    expect(galacticLatitudeDeg({ rightAscensionDeg: 192.85948, declinationDeg: 27.12825 })).toBeCloseTo(90, 4);
    expect(galacticLatitudeDeg({ rightAscensionDeg: 266.405, declinationDeg: -28.936 })).toBeCloseTo(0, 2);
  });

  it.each(OTHER_DAYS)('has one semester observed, one in review and one open at %s', (day) => {
    const now = new Date(day);
    const running = semesterDates('running', now);
    const reviewing = semesterDates('reviewing', now);
    const open = semesterDates('open', now);
    const today = day.slice(0, 10);
    expect(running.startsOn < today && today < running.endsOn).toBe(true);
    expect(running.decidedAt?.getTime()).toBeLessThan(Date.parse(running.startsOn));
    expect(reviewing.decidedAt).toBeNull();
    expect(reviewing.deadlineAt.getTime()).toBeLessThan(now.getTime());
    expect(reviewing.reviewsDueAt.getTime()).toBeGreaterThan(now.getTime());
    expect(reviewing.reviewsDueAt.getTime()).toBeLessThan(Date.parse(reviewing.startsOn));
    expect(open.callOpensAt.getTime()).toBeLessThan(now.getTime());
    expect(open.deadlineAt.getTime() - now.getTime()).toBeGreaterThan(10 * 86_400_000);
    expect(open.deadlineAt.getTime()).toBeLessThan(Date.parse(open.startsOn));
    expect(new Set([running, reviewing, open].map(({ labelPrefix }) => labelPrefix)).size).toBe(3);
    // Nights belong to one semester, and no night falls between two.
    expect(Date.parse(reviewing.startsOn) - Date.parse(running.endsOn)).toBe(86_400_000);
    expect(Date.parse(open.startsOn) - Date.parse(reviewing.endsOn)).toBe(86_400_000);
  });

  it('names a semester by its months', () => {
    expect(semesterDates('open', new Date('2027-02-03T00:00:00Z'))).toMatchObject({
      name: 'Oct 2027 to Mar 2028',
      labelPrefix: '2710',
      startsOn: '2027-10-01',
      endsOn: '2028-03-31',
    });
  });

  it('never dates anything after the moment it is opened', () => {
    for (const proposal of scenario.proposals) {
      const semester = scenario.semesters.find(({ id }) => id === proposal.semesterId);
      const past = [
        proposal.createdAt,
        proposal.updatedAt,
        ...proposal.members.flatMap(({ createdAt, signedAt }) => [createdAt, signedAt ?? createdAt]),
      ];
      for (const at of past) expect(at.getTime(), proposal.key).toBeLessThanOrEqual(NOW.getTime());
      expect(proposal.createdAt.getTime()).toBeGreaterThanOrEqual(semester?.callOpensAt.getTime() ?? Infinity);
      if (proposal.submittedAt !== null) {
        expect(proposal.submittedAt.getTime()).toBeLessThanOrEqual(semester?.deadlineAt.getTime() ?? 0);
        expect(proposal.submittedAt.getTime()).toBeGreaterThan(proposal.createdAt.getTime());
        expect(proposal.members.every(({ signedAt }) => signedAt !== null && signedAt <= proposal.submittedAt!)).toBe(
          true,
        );
      }
    }
  });

  it('submits only proposals with a case, targets and observations', () => {
    for (const proposal of scenario.proposals.filter(({ fate }) => fate !== 'draft')) {
      expect(
        proposal.case.map(({ sectionId }) => sectionId),
        proposal.key,
      ).toEqual(expect.arrayContaining(['science', 'technical']));
      expect(proposal.abstract.length, proposal.key).toBeGreaterThan(100);
      expect(proposal.observations.length, proposal.key).toBeGreaterThan(0);
    }
  });

  it('keeps the targets of a field together', () => {
    const group = data.proposals.find(({ key }) => key === 'V20')?.targets[0];
    const targets = scenario.proposals.find(({ key }) => key === 'V20')?.targets ?? [];
    const [first] = targets;
    for (const target of targets) {
      const separation = angularSeparationDeg(
        { raDeg: first?.rightAscensionDeg ?? 0, decDeg: first?.declinationDeg ?? 0 },
        { raDeg: target.rightAscensionDeg, decDeg: target.declinationDeg },
      );
      expect(separation).toBeLessThanOrEqual(2 * (group?.fields?.radiusDeg ?? 0) + 1e-4);
    }
  });

  it('has somebody to sign in as for every part', () => {
    const parts = scenario.people.flatMap(({ demoPart }) => (demoPart === null ? [] : [demoPart]));
    expect(parts.length).toBeGreaterThanOrEqual(8);
    for (const word of ['Principal', 'Co-investigator', 'Reviewer', 'Chair', 'staff', 'Administrator']) {
      expect(
        parts.some((part) => part.includes(word)),
        word,
      ).toBe(true);
    }
    expect(scenario.people.every(({ email }) => /^[a-z.-]+@[a-z.-]+\.example$/.test(email))).toBe(true);
  });
});

describe('random streams of the demo', () => {
  it('repeat, differ by name, and fill their range evenly', () => {
    const draw = (name: string, count: number) => {
      const stream = randomStream(name);
      return Array.from({ length: count }, () => stream.next());
    };
    expect(draw('a', 50)).toEqual(draw('a', 50));
    expect(draw('a', 5)).not.toEqual(draw('b', 5));
    const values = draw('even', 20_000);
    expect(values.every((value) => value >= 0 && value < 1)).toBe(true);
    for (let tenth = 0; tenth < 10; tenth += 1) {
      const share = values.filter((value) => Math.floor(10 * value) === tenth).length / values.length;
      // Five standard errors of a share of one tenth.
      expect(Math.abs(share - 0.1)).toBeLessThan(5 * Math.sqrt(0.09 / values.length));
    }
  });

  it('draw normal deviates of mean 0 and standard deviation 1', () => {
    const stream = randomStream('normal');
    const values = Array.from({ length: 20_000 }, () => stream.normal());
    const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
    const variance = values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / values.length;
    expect(Math.abs(mean)).toBeLessThan(5 / Math.sqrt(values.length));
    expect(Math.abs(variance - 1)).toBeLessThan(5 * Math.sqrt(2 / values.length));
  });
});

describe('identifiers of the demo', () => {
  it('are UUIDs that depend on every part of the name and on where it is divided', () => {
    expect(demoId('a', 'b')).toMatch(/^[0-9a-f]{8}-[0-9a-f]{4}-8[0-9a-f]{3}-[89ab][0-9a-f]{3}-[0-9a-f]{12}$/);
    expect(demoId('a', 'b')).toBe(demoId('a', 'b'));
    expect(new Set([demoId('a', 'b'), demoId('ab'), demoId('a', 'c'), demoId('a', 'b', '')]).size).toBe(4);
  });
});
