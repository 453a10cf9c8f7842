import { describe, expect, it } from 'vitest';
import { columnOfRole, guessColumnRoles, type ColumnRole } from './index.js';

function rolesOf(
  columns: readonly string[],
  rows: readonly (readonly string[])[],
): Partial<Record<ColumnRole, string>> {
  const roles: Partial<Record<ColumnRole, string>> = {};
  for (const { role, columnIndex } of guessColumnRoles(columns, rows).guesses) roles[role] = columns[columnIndex] ?? '';
  return roles;
}

describe('guessing what columns mean', () => {
  it.each([
    [
      ['Name', 'RA', 'Dec', 'z', 'mag'],
      ['A', '10:00:00', '-02:00:00', '3.2', '24.1'],
    ],
    [
      ['Target', 'RAJ2000', 'DEJ2000', 'zspec', 'V_mag'],
      ['A', '150.1', '-2.2', '3.2', '24.1'],
    ],
    [
      ['Object', 'RA_J2000 (deg)', 'dec_j2000 (deg)', 'Redshift', 'i mag'],
      ['A', '150.1', '-2.2', '3.2', '24.1'],
    ],
    [
      ['ID', 'α', 'δ', 'z_phot', 'F160W'],
      ['17', '150.1', '-2.2', '3.2', '24.1'],
    ],
    [
      ['source name', 'Right Ascension', 'Declination', 'z_spec', 'Magnitude (AB)'],
      ['A', '10 00 00', '-02 00 00', '3.2', '24.1'],
    ],
  ])('reads the header %j', (columns, row) => {
    expect(rolesOf(columns, [row])).toEqual({
      name: columns[0],
      rightAscension: columns[1],
      declination: columns[2],
      redshift: columns[3],
      magnitude: columns[4],
    });
  });

  it('tells a redshift from its uncertainty and a magnitude from its uncertainty', () => {
    expect(
      rolesOf(
        ['name', 'z', 'z_err', 'mag', 'mag_err', 'band', 'comments'],
        [['A', '3.2', '0.01', '24', '0.1', 'i', 'x']],
      ),
    ).toEqual({
      name: 'name',
      redshift: 'z',
      redshiftUncertainty: 'z_err',
      magnitude: 'mag',
      magnitudeSigma: 'mag_err',
      magnitudeBand: 'band',
      notes: 'comments',
    });
  });

  it('takes a column z full of 22s for a magnitude', () => {
    expect(
      rolesOf(
        ['name', 'z'],
        [
          ['A', '22.1'],
          ['B', '23.4'],
        ],
      ),
    ).toEqual({ name: 'name', magnitude: 'z' });
    expect(
      rolesOf(
        ['name', 'z'],
        [
          ['A', '2.1'],
          ['B', '3.4'],
        ],
      ),
    ).toEqual({ name: 'name', redshift: 'z' });
  });

  it('keeps a column that its header names although some cells are wrong', () => {
    expect(
      rolesOf(
        ['name', 'redshift'],
        [
          ['A', 'abc'],
          ['B', '-1'],
          ['C', '2.5'],
        ],
      ),
    ).toMatchObject({ redshift: 'redshift' });
    expect(rolesOf(['name', 'redshift'], [['A', 'abc']])).toMatchObject({ redshift: 'redshift' });
  });

  it('trusts a header less when most cells speak against it', () => {
    const [ra, dec] = guessColumnRoles(
      ['ra', 'dec'],
      [
        ['10:00:00', '150'],
        ['11:00:00', '170'],
      ],
    ).guesses;
    expect(ra).toMatchObject({ role: 'rightAscension', confidence: 1 });
    expect(dec).toMatchObject({ role: 'declination', confidence: 0.55 });
  });

  it('gives a role to one column only, the commoner word', () => {
    const mapping = guessColumnRoles(['alpha', 'ra', 'id', 'name'], [['150', '150', '1', 'A']]);
    expect(columnOfRole(mapping, 'rightAscension')).toBe(1);
    expect(columnOfRole(mapping, 'name')).toBe(3);
    expect(mapping.unassigned).toEqual([0, 2]);
  });

  it('reports the unit that the header states', () => {
    const mapping = guessColumnRoles(['RA [h]', 'Dec (deg)', 'ra_err'], [['10.5', '-2.5', '0.1']]);
    expect(mapping.guesses).toMatchObject([
      { role: 'rightAscension', unit: 'h' },
      { role: 'declination', unit: 'deg' },
    ]);
  });

  it('suggests coordinates and a name without a header, with little confidence', () => {
    const mapping = guessColumnRoles(
      ['Column 1', 'Column 2', 'Column 3', 'Column 4'],
      [
        ['Q 0000-26', '00:03:23.0', '-26:03:18', '4.111'],
        ['APM 08279', '08:31:41.6', '+52:45:18', '3.911'],
      ],
    );
    expect(mapping.guesses.map(({ role, columnIndex }) => [role, columnIndex])).toEqual([
      ['name', 0],
      ['rightAscension', 1],
      ['declination', 2],
    ]);
    expect(mapping.guesses.every((guess) => guess.confidence < 0.5)).toBe(true);
  });

  it('guesses nothing from nothing', () => {
    expect(guessColumnRoles([], [])).toEqual({ guesses: [], unassigned: [] });
    expect(guessColumnRoles(['foo', 'bar'], [])).toEqual({ guesses: [], unassigned: [0, 1] });
  });
});
