import type { ReactNode } from 'react';
import { PlainTable } from './PlainTable';

export interface ComparisonTableProps {
  /** What stands in the two columns: "before" and "after". */
  heads: readonly [string, string];
  rows: readonly { label: string; values: readonly [ReactNode, ReactNode] }[];
  /** The second column is what will stand. */
  secondStands?: boolean;
}

/** Two versions of one thing, value beside value. */
export function ComparisonTable({ heads, rows, secondStands = false }: ComparisonTableProps) {
  return (
    <PlainTable
      sx={{
        '& th, & td': { textAlign: 'left', verticalAlign: 'top', py: 0.75, pr: 2, overflowWrap: 'anywhere' },
        '& thead th': { color: 'text.secondary', fontSize: '0.8125rem', borderBottom: 1, borderColor: 'divider' },
        '& tbody th': { fontWeight: 400, color: 'text.secondary' },
        ...(secondStands ? { '& td:last-of-type': { fontWeight: 600, pr: 0 } } : {}),
      }}
    >
      <thead>
        <tr>
          <td />
          {heads.map((head) => (
            <th key={head} scope="col">
              {head}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map(({ label, values: [first, second] }) => (
          <tr key={label}>
            <th scope="row">{label}</th>
            <td>{first}</td>
            <td>{second}</td>
          </tr>
        ))}
      </tbody>
    </PlainTable>
  );
}
