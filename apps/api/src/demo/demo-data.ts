import { readFile } from 'node:fs/promises';
import path from 'node:path';
import type {
  BandId,
  CaseSectionId,
  Conditions,
  CosmologyChoice,
  Criterion,
  Goal,
  HoursByMoonClass,
  ModeConfiguration,
  RedshiftKind,
  TeamAccess,
} from '@faintward/contracts';

/** The folder of the invented data, beside the workspaces; the same relative path from sources and from the build. */
export const DEMO_FOLDER = path.resolve(import.meta.dirname, '../../../../seed/demo');

export type SemesterKey = 'running' | 'reviewing' | 'open';
export type PanelKey = 'galaxies' | 'quasars' | 'transients';
/** Lowest and highest value; each target draws its own in between. */
export type Span = readonly [low: number, high: number];

export interface FacilitiesData {
  site: {
    observatoryName: string;
    name: string;
    latitudeDeg: number;
    longitudeDegEast: number;
    elevationM: number;
    timeZone: string;
    zenithSeeingArcsec: number;
    outerScaleM: number;
  };
  telescopes: {
    key: string;
    name: string;
    diameterM: number;
    obstructionDiameterM: number;
    altitudeLowDeg: number;
    altitudeHighDeg: number;
    instruments: {
      key: string;
      name: string;
      description: string;
      modes: {
        key: string;
        name: string;
        /** Oldest first; the last is in force. */
        configurations: { daysBeforeNow: number; note: string; configuration: ModeConfiguration }[];
      }[];
    }[];
  }[];
}

export interface PeopleData {
  partners: { key: string; name: string; shareFraction: number }[];
  institutions: { key: string; name: string; country: string; partner: string | null }[];
  people: {
    key: string;
    givenName: string;
    familyName: string;
    institution: string;
    email: string;
    isStaff?: boolean;
    isAdministrator?: boolean;
    demoPart?: string;
  }[];
  panels: { key: PanelKey; name: string; chair: string; members: string[] }[];
}

export interface SemestersData {
  criteria: Criterion[];
  semesters: {
    key: SemesterKey;
    callText: string;
    isAnonymised: boolean;
    hours: Record<string, HoursByMoonClass>;
  }[];
}

/** The shape of a source's spectrum; spans are drawn for each target. */
export type SpectrumRecipe =
  | { kind: 'powerLaw'; slopeBeta: Span }
  | { kind: 'starForming'; slopeBeta: Span; breakRatio: Span }
  | { kind: 'passive' }
  | { kind: 'quasar'; template: 'powerLaws' | 'hewettWild2010' }
  | { kind: 'supernovaIa'; phaseDays: Span }
  | { kind: 'blackbody'; temperatureK: Span }
  /** One of the proposal's own, by its key. */
  | { kind: 'uploaded'; spectrum: string };

/** What lies between a source and us, where a recipe says it. */
interface WayRecipe {
  /** E(B−V) of the host. */
  hostDust?: Span;
  /** E(B−V) of the Milky Way, read off a map. */
  galacticDust?: Span;
  magnification?: Span;
  sigmaLnMagnification?: number;
}

export type LightRecipe = WayRecipe &
  (
    | { kind: 'apparentMagnitude'; bandId: BandId; magnitude: Span; spectrum: SpectrumRecipe }
    /** At 150 nm at rest. */
    | { kind: 'absoluteMagnitude'; magnitude: Span; spectrum: SpectrumRecipe }
    | { kind: 'lineFlux'; restWavelengthNm: number; fluxErgSCm2: Span; velocityWidthKmS: Span }
    | { kind: 'typical'; of: 'starFormingGalaxy' | 'supernovaIa'; spectrum: SpectrumRecipe }
  );

export interface RedshiftRecipe {
  low: number;
  high: number;
  /** With it the redshifts are photometric. */
  sigma?: number;
  /** Photometric ones are quoted by percentiles, wider above than below. */
  isSkewed?: boolean;
  /** A second solution, so that the whole distribution is given. */
  interloper?: { redshift: number; sigma: number; share: Span };
  kind?: RedshiftKind;
}

export type ExtentRecipe =
  | { kind: 'point' }
  | { kind: 'uniform' }
  | { kind: 'sersic'; halfLightRadius: Span; unit: 'kpc' | 'arcsec'; sersicIndex: Span; axisRatio: Span };

export interface TargetGroupData {
  count: number;
  /** Our own acronym, put before the designation by position. */
  designation: string;
  redshift: RedshiftRecipe;
  light: LightRecipe;
  extent: ExtentRecipe;
  /** The targets lie in so many fields; absent: each for itself. */
  fields?: { count: number; radiusDeg: number };
  declinationDeg?: Span;
  /** So many of the last targets say nothing about their light yet. */
  withoutLight?: number;
}

export interface SetupData {
  mode: string;
  goal: Goal;
  conditions: Conditions;
  repeatCount: number;
  /** Indices of target groups; absent: all. */
  groups?: number[];
  /** Only the first so many targets of these groups. */
  firstTargets?: number;
}

export interface ProposalData {
  key: string;
  semester: SemesterKey;
  panel: PanelKey;
  principal: string;
  /** What a reviewer without leniency and noise would give, 0 to 10. */
  quality: number;
  title: string;
  keywords: string[];
  abstract: string;
  case: Record<CaseSectionId, string>;
  targets: TargetGroupData[];
  setups: SetupData[];
  /** Uploaded by the team; `text` is read from the file. */
  spectra?: { key: string; name: string; source: string; file: string; observedAtRedshift: number; text: string }[];
  team?: { person: string; access: TeamAccess }[];
  fate: 'draft' | 'submitted' | 'withdrawn';
  cosmology?: CosmologyChoice;
  /** What a draft still lacks: these texts are left out. */
  lacking?: ('abstract' | CaseSectionId)[];
}

export interface CommentsData {
  /** For the principal investigator, by how good the reviewer found the proposal. */
  strong: string[];
  middling: string[];
  weak: string[];
  /** Closing sentences on the request itself. */
  request: string[];
  confidential: string[];
  /** Reasons that go out with awards. */
  awardFirm: string[];
  awardFlexible: string[];
  awardFiller: string[];
  declined: string[];
  /** Remarks of investigators beside their targets, by acronym. */
  targetNotes: Record<string, string[]>;
}

export interface DemoData {
  facilities: FacilitiesData;
  people: PeopleData;
  semesters: SemestersData;
  proposals: ProposalData[];
  comments: CommentsData;
}

/** Reads the files that describe the demo. */
export async function readDemoData(folder = DEMO_FOLDER): Promise<DemoData> {
  const [facilities, people, semesters, comments, ...proposals] = await Promise.all([
    readJson<FacilitiesData>(folder, 'facilities.json'),
    readJson<PeopleData>(folder, 'people.json'),
    readJson<SemestersData>(folder, 'semesters.json'),
    readJson<CommentsData>(folder, 'comments.json'),
    readJson<ProposalData[]>(folder, 'proposals-running.json'),
    readJson<ProposalData[]>(folder, 'proposals-reviewing.json'),
    readJson<ProposalData[]>(folder, 'proposals-open.json'),
  ]);
  const all = proposals.flat();
  for (const spectrum of all.flatMap(({ spectra }) => spectra ?? [])) {
    spectrum.text = await readFile(path.join(folder, spectrum.file), 'utf8');
  }
  return { facilities, people, semesters, comments, proposals: all };
}

/** The files belong to this code and are held to these shapes by its tests. */
async function readJson<Content>(folder: string, name: string): Promise<Content> {
  return JSON.parse(await readFile(path.join(folder, name), 'utf8')) as Content;
}
