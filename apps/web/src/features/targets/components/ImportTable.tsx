import { ImportRole, type ImportPreview } from '@faintward/contracts/targets';
import Box from '@mui/material/Box';
import { formatNumber } from '../../../lib/format';

const roleWords: Record<ImportRole, string> = {
  name: 'name',
  rightAscension: 'right ascension',
  declination: 'declination',
  redshift: 'redshift',
  redshiftUncertainty: 'uncertainty of redshift',
  brightness: 'brightness',
  notes: 'notes',
  ignore: 'left out',
};

/** The first rows and the faulty ones as the server read them, with what each column is taken for. */
export function ImportTable({
  preview,
  onlyFaulty,
  disabled,
  onRole,
}: {
  preview: ImportPreview;
  onlyFaulty: boolean;
  disabled: boolean;
  onRole: (index: number, role: ImportRole) => void;
}) {
  const rows = onlyFaulty ? preview.rows.filter((row) => !row.isReady) : preview.rows;
  return (
    <Box>
      <Box
        tabIndex={0}
        role="region"
        aria-label="Preview of the table"
        sx={{ maxHeight: 380, overflow: 'auto', border: 1, borderColor: 'divider', borderRadius: '6px' }}
      >
        <Box
          component="table"
          sx={{
            borderCollapse: 'separate',
            borderSpacing: 0,
            minWidth: '100%',
            fontSize: '0.8125rem',
            fontVariantNumeric: 'tabular-nums lining-nums',
            '& th, & td': {
              textAlign: 'left',
              verticalAlign: 'top',
              px: 1.25,
              py: 0.6,
              borderBottom: 1,
              borderColor: 'divider',
              maxWidth: 320,
            },
            '& thead th': { position: 'sticky', top: 0, bgcolor: 'faintward.raised', zIndex: 1, fontWeight: 600 },
            '& .line': { color: 'text.secondary', textAlign: 'right', fontWeight: 400 },
            '& .left-out': { color: 'text.secondary' },
            '& .wrong': { boxShadow: 'inset 2px 0 0 var(--fw-palette-error-main)' },
          }}
        >
          <thead>
            <tr>
              <th scope="col" className="line">
                line
              </th>
              {preview.columns.map((column, index) => (
                <th scope="col" key={index}>
                  <Box sx={{ mb: 0.5, overflowWrap: 'anywhere' }}>{column.header || `column ${index + 1}`}</Box>
                  <Box
                    component="select"
                    aria-label={`${column.header || `Column ${index + 1}`} is`}
                    value={column.role}
                    disabled={disabled}
                    onChange={(event) => onRole(index, ImportRole.parse(event.target.value))}
                    sx={{
                      font: 'inherit',
                      fontWeight: 400,
                      color: column.role === 'ignore' ? 'text.secondary' : 'text.primary',
                      bgcolor: 'background.paper',
                      border: 1,
                      borderColor: 'faintward.edge',
                      borderRadius: '4px',
                      px: 0.5,
                      minHeight: 28,
                    }}
                  >
                    {ImportRole.options.map((role) => (
                      <option key={role} value={role}>
                        {roleWords[role]}
                      </option>
                    ))}
                  </Box>
                </th>
              ))}
              <th scope="col">row</th>
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => (
              <tr key={row.lineNumber}>
                <th scope="row" className="line">
                  {row.lineNumber}
                </th>
                {row.cells.map((cell, index) => (
                  <td
                    key={index}
                    className={
                      cell.error ? 'wrong' : preview.columns[index]?.role === 'ignore' ? 'left-out' : undefined
                    }
                  >
                    <Box sx={{ overflowWrap: 'anywhere' }}>{cell.text || '—'}</Box>
                    {cell.error && (
                      <Box sx={{ color: 'error.main', minWidth: 160 }}>
                        <span aria-hidden="true">▲ </span>
                        {cell.error}
                      </Box>
                    )}
                    {cell.warning && <Box sx={{ color: 'warning.main', minWidth: 160 }}>{cell.warning}</Box>}
                  </td>
                ))}
                <td>
                  {row.rowErrors.map((message) => (
                    <Box key={message} sx={{ color: 'error.main', minWidth: 160 }}>
                      <span aria-hidden="true">▲ </span>
                      {message}
                    </Box>
                  ))}
                  {row.isDuplicate
                    ? 'in the list already'
                    : row.isReady
                      ? 'ready'
                      : row.rowErrors.length === 0 && 'faulty'}
                </td>
              </tr>
            ))}
          </tbody>
        </Box>
      </Box>
      {preview.rowCount > preview.rows.length && (
        <Box sx={{ fontSize: '0.8125rem', color: 'text.secondary', mt: 0.5 }}>
          {formatNumber(preview.rows.length, { decimals: 0 })} of {formatNumber(preview.rowCount, { decimals: 0 })}{' '}
          rows: the first ones, and faulty ones as far as there is room.
        </Box>
      )}
    </Box>
  );
}
