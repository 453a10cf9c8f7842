import type { Me } from '@faintward/contracts/accounts';
import type { Estimate } from '@faintward/contracts/estimates';
import type { OpenCalls, Semester } from '@faintward/contracts/semesters';

/** Invented answers for tests, whole enough for the contracts. */
export const id = (number: number) => `00000000-0000-4000-8000-${String(number).padStart(12, '0')}`;

export const semester: Semester = {
  semesterId: id(1),
  name: 'Oct 2027 to Mar 2028',
  startsOn: '2027-10-01',
  endsOn: '2028-03-31',
  callOpensAt: '2027-02-01T12:00:00Z',
  deadlineAt: '2099-03-31T18:00:00Z',
  reviewsDueAt: null,
  decidedAt: null,
  stage: 'open',
  isAnonymised: true,
  callText: 'Proposals are invited.',
  siteTimeZone: 'America/Santiago',
  criteria: [
    { criterionId: 'merit', title: 'Merit', weight: 1, anchors: { low: 'low', middle: 'middle', high: 'high' } },
  ],
  telescopes: [{ telescopeId: id(2), telescopeName: 'Lumbre', availableHours: { dark: 620, grey: 340, bright: 410 } }],
  version: 1,
};

export const calls: OpenCalls = {
  observatoryName: 'Cerro Lumbre Observatory',
  siteTimeZone: 'America/Santiago',
  now: '2027-03-01T00:00:00Z',
  calls: [semester],
};

export const me: Me = {
  personId: id(3),
  email: 'm.orlandi@lumbre.example',
  givenName: 'Maddalena',
  familyName: 'Orlandi',
  institution: null,
  orcid: null,
  isStaff: true,
  isAdministrator: true,
  panels: [
    {
      panelId: id(4),
      panelName: 'Distant galaxies',
      semesterId: id(1),
      semesterName: 'Oct 2027 to Mar 2028',
      role: 'chair',
    },
  ],
};

export const infeasible: Estimate = {
  outcome: 'infeasible',
  engineVersion: '0.1.0',
  referenceDataVersion: '2026-12',
  inputHash: 'abcdef0123456789',
  cosmologyId: 'planck18',
  steps: [],
  notices: [],
  fwhmArcsec: 0.8,
  wavelengthNm: 1250,
  reason: { code: 'no-flux', message: 'No light of this source reaches the band.' },
  apparentMagnitudeAb: null,
};
