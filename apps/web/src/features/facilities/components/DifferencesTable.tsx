import Box from '@mui/material/Box';
import type { Difference } from '../configurationFields';

/** Before and after, value by value. */
export function DifferencesTable({
  rows,
  before,
  after,
}: {
  rows: readonly Difference[];
  before: string;
  after: string;
}) {
  return (
    <Box
      component="table"
      sx={{
        width: '100%',
        borderCollapse: 'collapse',
        fontSize: '0.875rem',
        '& th, & td': { textAlign: 'left', verticalAlign: 'top', py: 0.75, pr: 2, overflowWrap: 'anywhere' },
        '& thead th': { color: 'text.secondary', fontSize: '0.8125rem', borderBottom: 1, borderColor: 'divider' },
        '& tbody th': { fontWeight: 400, color: 'text.secondary' },
        '& td:last-of-type': { fontWeight: 600, pr: 0 },
      }}
    >
      <thead>
        <tr>
          <td />
          <th scope="col">{before}</th>
          <th scope="col">{after}</th>
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <tr key={row.label}>
            <th scope="row">{row.label}</th>
            <td>{row.before}</td>
            <td>{row.after}</td>
          </tr>
        ))}
      </tbody>
    </Box>
  );
}
