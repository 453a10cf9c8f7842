import type { ModeConfiguration } from '@faintward/contracts/facilities';
import type { PanelRole } from '@faintward/contracts/permissions';
import type { ProposalState } from '@faintward/contracts/proposals';
import type { Criterion, HoursByMoonClass } from '@faintward/contracts/semesters';
import type { SubmittedContent } from '@faintward/contracts/submissions';
import { assignments } from '../../apps/api/src/database/schema/assignments.js';
import {
  instruments,
  modeConfigurations,
  modes,
  sites,
  telescopes,
} from '../../apps/api/src/database/schema/facilities.js';
import { panelMembers, panels } from '../../apps/api/src/database/schema/panels.js';
import { proposalMembers, proposals } from '../../apps/api/src/database/schema/proposals.js';
import { reviews } from '../../apps/api/src/database/schema/reviews.js';
import { semesterHours, semesters } from '../../apps/api/src/database/schema/semesters.js';
import { submissions } from '../../apps/api/src/database/schema/submissions.js';
import type { TestApp } from '../api/support/app.js';
import { aPerson, type TestPerson } from './people.js';

let serial = 0;

export const MERIT: Criterion = {
  criterionId: 'merit',
  title: 'Scientific merit',
  weight: 3,
  anchors: { low: 'adds little', middle: 'solid', high: 'outstanding' },
};
export const METHOD: Criterion = {
  criterionId: 'method',
  title: 'Method',
  weight: 1,
  anchors: { low: 'unclear', middle: 'sound', high: 'exemplary' },
};

function only<Row>(rows: Row[]): Row {
  const [row] = rows;
  if (row === undefined) throw new Error('An insert returned no row.');
  return row;
}

export async function aSite(app: TestApp, overrides: Partial<typeof sites.$inferInsert> = {}) {
  serial += 1;
  return only(
    await app.db
      .insert(sites)
      .values({
        observatoryName: 'Test Ridge Observatory',
        name: `Test Ridge ${serial}`,
        latitudeDeg: -24.5,
        longitudeDegEast: -70.25,
        elevationM: 2600,
        timeZone: 'America/Santiago',
        zenithSeeingArcsec: 0.8,
        ...overrides,
      })
      .returning(),
  );
}

export async function aTelescope(app: TestApp, overrides: Partial<typeof telescopes.$inferInsert> = {}) {
  serial += 1;
  const siteId = overrides.siteId ?? (await aSite(app)).id;
  return only(
    await app.db
      .insert(telescopes)
      .values({
        siteId,
        name: `Telescope ${serial}`,
        diameterM: 4,
        obstructionDiameterM: 1,
        altitudeLowDeg: 20,
        altitudeHighDeg: 88,
        ...overrides,
      })
      .returning(),
  );
}

export const IMAGING: ModeConfiguration = {
  kind: 'imaging',
  bandId: 'r',
  label: 'r imaging',
  wavelengthLowNm: 550,
  wavelengthHighNm: 690,
  throughput: 0.4,
  extinctionMagPerAirmass: 0.1,
  skyAbMagPerArcsec2: { dark: 21, grey: 20, bright: 18.5 },
  detector: {
    pixelScaleArcsec: 0.2,
    darkElectronsPerSecond: 0.001,
    readNoiseElectrons: 4,
    fullWellElectrons: 120_000,
    gainElectronsPerAdu: 1.5,
  },
  exposureLimits: { minimumExposureSeconds: 1, maximumExposureSeconds: 1800 },
  overheads: {
    acquisitionSeconds: 120,
    setupSeconds: 60,
    readoutSeconds: 30,
    ditherSeconds: 10,
    maximumBlockSeconds: 3600,
  },
};

export async function aMode(app: TestApp, overrides: { name?: string; configuration?: ModeConfiguration } = {}) {
  serial += 1;
  const telescope = await aTelescope(app);
  const instrument = only(
    await app.db
      .insert(instruments)
      .values({ telescopeId: telescope.id, name: `Instrument ${serial}`, description: 'For tests.' })
      .returning(),
  );
  const mode = only(
    await app.db
      .insert(modes)
      .values({ instrumentId: instrument.id, name: overrides.name ?? `Mode ${serial}` })
      .returning(),
  );
  await app.db
    .insert(modeConfigurations)
    .values({ modeId: mode.id, version: 1, configuration: overrides.configuration ?? IMAGING });
  return { mode, instrument, telescope };
}

const DAY_MS = 86_400_000;

/** The instant so many days from now. */
export function inDays(days: number): Date {
  return new Date(Date.now() + days * DAY_MS);
}

/** A semester whose deadline passed ten days ago and whose proposals are being reviewed. */
export async function aSemester(
  app: TestApp,
  overrides: Partial<typeof semesters.$inferInsert> & { hours?: HoursByMoonClass } = {},
) {
  serial += 1;
  const { hours = { dark: 100, grey: 50, bright: 50 }, ...columns } = overrides;
  const telescope = await aTelescope(app, columns.siteId === undefined ? {} : { siteId: columns.siteId });
  const semester = only(
    await app.db
      .insert(semesters)
      .values({
        siteId: telescope.siteId,
        name: `Semester ${serial}`,
        labelPrefix: `S${serial}`,
        startsOn: inDays(40).toISOString().slice(0, 10),
        endsOn: inDays(220).toISOString().slice(0, 10),
        callOpensAt: inDays(-60),
        deadlineAt: inDays(-10),
        isAnonymised: false,
        criteria: [MERIT, METHOD],
        ...columns,
      })
      .returning(),
  );
  await app.db.insert(semesterHours).values({
    semesterId: semester.id,
    telescopeId: telescope.id,
    darkHours: hours.dark,
    greyHours: hours.grey,
    brightHours: hours.bright,
  });
  return semester;
}

export async function aPanel(app: TestApp, overrides: Partial<typeof panels.$inferInsert> = {}) {
  serial += 1;
  const semesterId = overrides.semesterId ?? (await aSemester(app)).id;
  return only(
    await app.db
      .insert(panels)
      .values({ name: `Panel ${serial}`, ...overrides, semesterId })
      .returning(),
  );
}

export async function aPanelMember(
  app: TestApp,
  panel: { id: string },
  role: PanelRole = 'member',
  overrides: Parameters<typeof aPerson>[1] = {},
): Promise<TestPerson> {
  const person = await aPerson(app, overrides);
  await app.db.insert(panelMembers).values({ panelId: panel.id, personId: person.id, role });
  return person;
}

export function someContent(overrides: Partial<SubmittedContent> = {}): SubmittedContent {
  return {
    title: 'Faint things far away',
    abstract: 'We ask for time.',
    keywords: [],
    partnerName: 'Partner of the team',
    cosmology: 'planck18',
    case: [{ sectionId: 'science', title: 'Science', body: 'Because.' }],
    team: [{ name: 'Pat Principal', institutionName: 'Institute of Names', isPrincipal: true, hasSigned: true }],
    targets: [],
    observations: [],
    timeRequest: {
      rows: [],
      totals: { dark: 10, grey: 0, bright: 0 },
      totalHours: 10,
      infeasibleCount: 0,
      lackingCount: 0,
    },
    engineVersion: 'test',
    ...overrides,
  };
}

/** A proposal as its panel meets it: with a team and a current submission. */
export async function aSubmittedProposal(
  app: TestApp,
  panel: { id: string; semesterId: string },
  options: {
    title?: string;
    requestedHours?: HoursByMoonClass;
    principal?: TestPerson;
    coInvestigators?: TestPerson[];
    state?: ProposalState;
    content?: Partial<SubmittedContent>;
  } = {},
) {
  serial += 1;
  const principal = options.principal ?? (await aPerson(app));
  const title = options.title ?? `Proposal ${serial}`;
  const requestedHours = options.requestedHours ?? { dark: 10, grey: 0, bright: 0 };
  const proposal = only(
    await app.db
      .insert(proposals)
      .values({
        semesterId: panel.semesterId,
        panelId: panel.id,
        number: serial,
        // What is submitted is read, not this.
        title: 'Working title',
        state: options.state ?? 'submitted',
      })
      .returning(),
  );
  await app.db.insert(proposalMembers).values([
    { proposalId: proposal.id, personId: principal.id, access: 'editsEverything', isPrincipal: true },
    ...(options.coInvestigators ?? []).map((person) => ({
      proposalId: proposal.id,
      personId: person.id,
      access: 'reads' as const,
    })),
  ]);
  await app.db.insert(submissions).values({
    proposalId: proposal.id,
    number: 1,
    submittedBy: principal.id,
    content: someContent({ title, ...options.content }),
    fingerprint: 'f'.repeat(64),
    requestedHours,
    targetCount: 3,
  });
  return { ...proposal, title, principal };
}

export async function anAssignment(
  app: TestApp,
  proposal: { id: string; panelId: string | null },
  person: { id: string },
): Promise<void> {
  if (proposal.panelId === null) throw new Error('A proposal without a panel cannot be assigned.');
  await app.db.insert(assignments).values({ panelId: proposal.panelId, proposalId: proposal.id, personId: person.id });
}

/** An assignment with its complete review, both criteria scored alike. */
export async function aReview(
  app: TestApp,
  proposal: { id: string; panelId: string | null },
  person: { id: string },
  score: number,
): Promise<void> {
  await anAssignment(app, proposal, person);
  await app.db.insert(reviews).values({
    proposalId: proposal.id,
    personId: person.id,
    answers: { merit: { kind: 'score', score }, method: { kind: 'score', score } },
    overallScore: score,
    isComplete: true,
    commentToPrincipal: 'Well argued.',
  });
}
