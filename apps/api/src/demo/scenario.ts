import type {
  CaseSectionId,
  Conditions,
  CosmologyChoice,
  Goal,
  HoursByMoonClass,
  ModeConfiguration,
  PanelRole,
  ProposalState,
  TeamAccess,
} from '@faintward/contracts';
import { daysFrom, middleOf, semesterDates, type SemesterDates } from './calendar.js';
import type { DemoData, ProposalData, SemesterKey } from './demo-data.js';
import { demoId } from './identifiers.js';
import { randomStream, type RandomStream } from './random.js';
import { type DemoTarget, targetsOf } from './target-lists.js';

/** Everything of the demo that is told, not computed: no magnitude, second or score in here comes from the engine. */
export interface Scenario {
  site: DemoData['facilities']['site'] & { id: string };
  telescopes: TelescopeRow[];
  instruments: InstrumentRow[];
  modes: ModeRow[];
  modeConfigurations: ModeConfigurationRow[];
  partners: { id: string; name: string; shareFraction: number }[];
  institutions: { id: string; name: string; country: string; partnerId: string | null }[];
  people: PersonRow[];
  semesters: SemesterRow[];
  semesterHours: (HoursByMoonClass & { semesterId: string; telescopeId: string })[];
  panels: PanelRow[];
  panelMembers: { panelId: string; personId: string; role: PanelRole }[];
  proposals: ProposalRow[];
}

interface TelescopeRow {
  id: string;
  siteId: string;
  name: string;
  diameterM: number;
  obstructionDiameterM: number;
  altitudeLowDeg: number;
  altitudeHighDeg: number;
  position: number;
}
interface InstrumentRow {
  id: string;
  telescopeId: string;
  name: string;
  description: string;
  position: number;
}
interface ModeRow {
  id: string;
  instrumentId: string;
  name: string;
  position: number;
  configurationVersion: number;
}
interface ModeConfigurationRow {
  id: string;
  modeId: string;
  version: number;
  configuration: ModeConfiguration;
  note: string;
  createdBy: string;
  createdAt: Date;
}
interface PersonRow {
  id: string;
  key: string;
  email: string;
  givenName: string;
  familyName: string;
  institutionId: string;
  isStaff: boolean;
  isAdministrator: boolean;
  demoPart: string | null;
  createdAt: Date;
  lastSignInAt: Date | null;
}
export interface SemesterRow extends SemesterDates {
  id: string;
  key: SemesterKey;
  siteId: string;
  isAnonymised: boolean;
  callText: string;
  criteria: DemoData['semesters']['criteria'];
  createdAt: Date;
}
export interface PanelRow {
  id: string;
  semesterKey: SemesterKey;
  semesterId: string;
  name: string;
  chairId: string;
  position: number;
  finalisedAt: Date | null;
  finalisedBy: string | null;
}
export interface MemberRow {
  id: string;
  personId: string;
  access: TeamAccess;
  isPrincipal: boolean;
  signedAt: Date | null;
  position: number;
  createdAt: Date;
}
export interface PlannedObservation {
  id: string;
  targetId: string;
  modeId: string;
  goal: Goal;
  conditions: Conditions;
  repeatCount: number;
}
export interface ProposalRow {
  id: string;
  key: string;
  semesterKey: SemesterKey;
  semesterId: string;
  panelId: string;
  partnerId: string | null;
  number: number;
  title: string;
  abstract: string;
  keywords: string[];
  state: ProposalState;
  fate: ProposalData['fate'];
  quality: number;
  cosmology: CosmologyChoice;
  createdAt: Date;
  updatedAt: Date;
  submittedAt: Date | null;
  members: MemberRow[];
  case: { sectionId: CaseSectionId; body: string }[];
  spectra: NonNullable<ProposalData['spectra']>;
  targets: DemoTarget[];
  observations: PlannedObservation[];
}

/**
 * Lays the demo out for an observatory that is opened at `now`. The same data and the same `now` give the same scenario to
 * the last digit; a later `now` moves the dates, and with the semesters the part of the sky that the targets lie in.
 *
 * @throws {RangeError} when the data name a person, mode or panel that is not there
 */
export function buildScenario(data: DemoData, now: Date): Scenario {
  const site = { ...data.facilities.site, id: demoId('site') };
  const personIds = indexBy(
    data.people.people,
    (person) => person.key,
    (person) => demoId('person', person.key),
  );
  const partnerIds = indexBy(
    data.people.partners,
    (partner) => partner.key,
    (partner) => demoId('partner', partner.key),
  );
  const facilities = layOutFacilities(data, site.id, find(personIds, 'joaquin'), now);
  const semesters = data.semesters.semesters.map(({ key, callText, isAnonymised }): SemesterRow => ({
    id: demoId('semester', key),
    key,
    siteId: site.id,
    ...semesterDates(key, now),
    isAnonymised,
    callText,
    criteria: data.semesters.criteria,
    createdAt: daysFrom(semesterDates(key, now).callOpensAt, -20),
  }));
  const panels = semesters.flatMap((semester) =>
    data.people.panels.map((panel, position): PanelRow => ({
      id: demoId('panel', semester.key, panel.key),
      semesterKey: semester.key,
      semesterId: semester.id,
      name: panel.name,
      chairId: find(personIds, panel.chair),
      position,
      finalisedAt: semester.decidedAt,
      finalisedBy: semester.decidedAt === null ? null : find(personIds, panel.chair),
    })),
  );
  return {
    site,
    ...facilities,
    partners: data.people.partners.map(({ key, name, shareFraction }) => ({
      id: find(partnerIds, key),
      name,
      shareFraction,
    })),
    institutions: data.people.institutions.map(({ key, name, country, partner }) => ({
      id: demoId('institution', key),
      name,
      country,
      partnerId: partner === null ? null : find(partnerIds, partner),
    })),
    people: data.people.people.map((person, index): PersonRow => ({
      id: find(personIds, person.key),
      key: person.key,
      email: person.email,
      givenName: person.givenName,
      familyName: person.familyName,
      institutionId: demoId('institution', person.institution),
      isStaff: person.isStaff ?? false,
      isAdministrator: person.isAdministrator ?? false,
      demoPart: person.demoPart ?? null,
      createdAt: daysFrom(now, -400 + index),
      lastSignInAt: daysFrom(now, -randomStream(`last visit of ${person.key}`).between(0.2, 40)),
    })),
    semesters,
    semesterHours: semesters.flatMap((semester) => {
      const hours = data.semesters.semesters.find(({ key }) => key === semester.key)?.hours ?? {};
      return Object.entries(hours).map(([telescope, available]) => ({
        semesterId: semester.id,
        telescopeId: demoId('telescope', telescope),
        ...available,
      }));
    }),
    panels,
    panelMembers: semesters.flatMap((semester) =>
      data.people.panels.flatMap((panel) =>
        [panel.chair, ...panel.members].map((person) => ({
          panelId: demoId('panel', semester.key, panel.key),
          personId: find(personIds, person),
          role: person === panel.chair ? ('chair' as const) : ('member' as const),
        })),
      ),
    ),
    proposals: semesters.flatMap((semester) =>
      data.proposals
        .filter((proposal) => proposal.semester === semester.key)
        .map((proposal) => layOutProposal(proposal, semester, data, now))
        // The observatory numbers proposals as they are begun.
        .sort((a, b) => a.createdAt.getTime() - b.createdAt.getTime())
        .map((proposal, index): ProposalRow => ({ ...proposal, number: index + 1 })),
    ),
  };
}

function layOutFacilities(data: DemoData, siteId: string, staffId: string, now: Date) {
  const telescopes: TelescopeRow[] = [];
  const instruments: InstrumentRow[] = [];
  const modes: ModeRow[] = [];
  const modeConfigurations: ModeConfigurationRow[] = [];
  for (const [position, telescope] of data.facilities.telescopes.entries()) {
    const { key, name, diameterM, obstructionDiameterM, altitudeLowDeg, altitudeHighDeg } = telescope;
    const telescopeId = demoId('telescope', key);
    telescopes.push({
      id: telescopeId,
      siteId,
      name,
      diameterM,
      obstructionDiameterM,
      altitudeLowDeg,
      altitudeHighDeg,
      position,
    });
    for (const [instrumentPosition, instrument] of telescope.instruments.entries()) {
      const instrumentId = demoId('instrument', instrument.key);
      instruments.push({
        id: instrumentId,
        telescopeId,
        name: instrument.name,
        description: instrument.description,
        position: instrumentPosition,
      });
      for (const [modePosition, mode] of instrument.modes.entries()) {
        const modeId = demoId('mode', mode.key);
        modes.push({
          id: modeId,
          instrumentId,
          name: mode.name,
          position: modePosition,
          configurationVersion: mode.configurations.length,
        });
        modeConfigurations.push(
          ...mode.configurations.map(({ daysBeforeNow, note, configuration }, index) => ({
            id: demoId('configuration', mode.key, String(index + 1)),
            modeId,
            version: index + 1,
            configuration,
            note,
            createdBy: staffId,
            createdAt: daysFrom(now, -daysBeforeNow),
          })),
        );
      }
    }
  }
  return { telescopes, instruments, modes, modeConfigurations };
}

function layOutProposal(
  proposal: ProposalData,
  semester: SemesterRow,
  data: DemoData,
  now: Date,
): Omit<ProposalRow, 'number'> {
  const random = randomStream(`proposal ${proposal.key}`);
  const id = demoId('proposal', proposal.key);
  const latest = new Date(Math.min(now.getTime() - 1_200_000, semester.deadlineAt.getTime()));
  const opened = semester.callOpensAt;
  const openDays = (latest.getTime() - opened.getTime()) / 86_400_000;
  const createdAt = daysFrom(opened, random.between(0.02, 0.45) * openDays);
  // Most submissions arrive in the last days of a call.
  const submittedAt =
    proposal.fate === 'draft' ? null : daysFrom(latest, -Math.min(0.5 * openDays, 0.01 + 6 * random.next() ** 3));
  const lacking = new Set(proposal.lacking ?? []);
  const principal = personOf(data, proposal.principal);
  const team = proposal.team ?? drawTeam(proposal, data);
  const targets = targetsOf(
    proposal,
    middleOf(semester),
    data.facilities.site.longitudeDegEast,
    data.comments.targetNotes,
  );
  const everybody = [{ person: principal.key, access: 'editsEverything' as TeamAccess }, ...team];
  return {
    id,
    key: proposal.key,
    semesterKey: semester.key,
    semesterId: semester.id,
    panelId: demoId('panel', semester.key, proposal.panel),
    partnerId: partnerOf(
      data,
      everybody.map(({ person }) => person),
    ),
    title: proposal.title,
    abstract: lacking.has('abstract') ? '' : proposal.abstract,
    keywords: proposal.keywords,
    state: stateOf(proposal),
    fate: proposal.fate,
    quality: proposal.quality,
    cosmology: proposal.cosmology ?? 'planck18',
    createdAt,
    updatedAt: submittedAt ?? daysFrom(now, -random.between(0.1, 4)),
    submittedAt,
    members: everybody.map(({ person, access }, position) => ({
      id: demoId('member', proposal.key, person),
      personId: demoId('person', personOf(data, person).key),
      access,
      isPrincipal: position === 0,
      signedAt: signatureOf(position === 0, submittedAt, now, random),
      position,
      createdAt: daysFrom(createdAt, position === 0 ? 0 : random.between(0.05, 1)),
    })),
    case: (['science', 'technical', 'background'] as const).flatMap((sectionId) => {
      const body = lacking.has(sectionId) ? '' : proposal.case[sectionId];
      return body === '' ? [] : [{ sectionId, body }];
    }),
    spectra: proposal.spectra ?? [],
    targets,
    observations: proposal.setups.flatMap((setup, setupIndex) => {
      const { groups } = setup;
      const wanted = targets.filter(({ groupIndex }) => groups === undefined || groups.includes(groupIndex));
      return wanted.slice(0, setup.firstTargets ?? wanted.length).map((target): PlannedObservation => ({
        id: demoId('observation', proposal.key, String(setupIndex), target.name),
        targetId: target.targetId,
        modeId: demoId('mode', modeKey(data, setup.mode)),
        goal: setup.goal,
        conditions: setup.conditions,
        repeatCount: setup.repeatCount,
      }));
    }),
  };
}

/** The principal investigator signs by submitting; the others had done so before, and most of those on a draft have too. */
function signatureOf(isPrincipal: boolean, submittedAt: Date | null, now: Date, random: RandomStream): Date | null {
  if (submittedAt !== null) return isPrincipal ? submittedAt : daysFrom(submittedAt, -random.between(0.05, 0.4));
  return !isPrincipal && random.next() < 0.6 ? daysFrom(now, -random.between(0.1, 3)) : null;
}

function stateOf(proposal: ProposalData): ProposalState {
  if (proposal.fate === 'draft' || proposal.fate === 'withdrawn') return proposal.fate;
  // The awards of the decided semester turn this into awarded or declined.
  return proposal.semester === 'open' ? 'submitted' : 'inReview';
}

/** Two to four co-investigators: somebody from next door, and the rest from all over. */
function drawTeam(proposal: ProposalData, data: DemoData): { person: string; access: TeamAccess }[] {
  const random = randomStream(`team of ${proposal.key}`);
  const { institution } = personOf(data, proposal.principal);
  const free = random
    .shuffled(data.people.people)
    .filter(
      (person) => person.key !== proposal.principal && !(person.isStaff ?? false) && !(person.isAdministrator ?? false),
    );
  const near = free.filter((person) => person.institution === institution).slice(0, 1);
  const far = free.filter((person) => person.institution !== institution).slice(0, random.integer(1, 3));
  const accesses: TeamAccess[] = ['editsTargets', 'editsEverything', 'reads', 'reads'];
  return [...near, ...far].map((person, index) => ({ person: person.key, access: accesses[index] ?? 'reads' }));
}

/** The partner of the first on the team whose institution belongs to one. */
function partnerOf(data: DemoData, personKeys: readonly string[]): string | null {
  for (const key of personKeys) {
    const { institution } = personOf(data, key);
    const partner = data.people.institutions.find((candidate) => candidate.key === institution)?.partner;
    if (partner != null) return demoId('partner', partner);
  }
  return null;
}

function personOf(data: DemoData, key: string): DemoData['people']['people'][number] {
  const person = data.people.people.find((candidate) => candidate.key === key);
  if (person === undefined) throw new RangeError(`Nobody in the demo is called "${key}".`);
  return person;
}

function modeKey(data: DemoData, key: string): string {
  const isKnown = data.facilities.telescopes.some(({ instruments }) =>
    instruments.some(({ modes }) => modes.some((mode) => mode.key === key)),
  );
  if (!isKnown) throw new RangeError(`No instrument of the demo has a mode "${key}".`);
  return key;
}

function indexBy<Item, Value>(items: readonly Item[], keyOf: (item: Item) => string, valueOf: (item: Item) => Value) {
  return new Map(items.map((item) => [keyOf(item), valueOf(item)]));
}

function find<Value>(index: ReadonlyMap<string, Value>, key: string): Value {
  const value = index.get(key);
  if (value === undefined) throw new RangeError(`Nothing in the demo is called "${key}".`);
  return value;
}
