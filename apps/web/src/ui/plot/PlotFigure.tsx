import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Collapse from '@mui/material/Collapse';
import Typography from '@mui/material/Typography';
import { useId, useState, type ReactNode, type Ref } from 'react';
import { downloadText, toCsv } from '../../lib/csv';
import { formatNumber } from '../../lib/format';

/** The numbers behind a picture, as they are shown and downloaded. */
export interface PlotTable {
  header: readonly string[];
  rows: readonly (readonly (string | number | null)[])[];
  /** Names of the columns in the file, when those shown are too long for it. */
  fileHeader?: readonly string[];
  /** How a number is shown; the file has every digit. */
  format?: (value: number, column: number) => string;
}

/** The frame of every picture: its title, its numbers as a table and as a file behind it. */
export function PlotFigure({
  title,
  note,
  description,
  table,
  fileName,
  actions,
  box,
  children,
}: {
  title: ReactNode;
  /** One quiet line under the title. */
  note?: ReactNode;
  /** Names the table of numbers. */
  description: string;
  table: PlotTable;
  fileName: string;
  /** Switches of the picture, between title and drawing. */
  actions?: ReactNode;
  /** Measured by the picture. */
  box?: Ref<HTMLDivElement>;
  children: ReactNode;
}) {
  const [tableOpen, setTableOpen] = useState(false);
  const id = useId();
  return (
    <Box component="figure" ref={box} aria-labelledby={id} sx={{ minWidth: 0 }}>
      <Box component="figcaption" sx={{ display: 'flex', gap: 1, alignItems: 'baseline', flexWrap: 'wrap', mb: 0.5 }}>
        <Typography variant="h3" component="span" id={id} sx={{ flex: 1, minWidth: 0 }}>
          {title}
        </Typography>
        <Button size="small" variant="text" aria-expanded={tableOpen} onClick={() => setTableOpen(!tableOpen)}>
          {tableOpen ? 'Hide the numbers' : 'Numbers'}
        </Button>
        <Button
          size="small"
          variant="text"
          onClick={() => downloadText(fileName, toCsv(table.fileHeader ?? table.header, table.rows))}
        >
          CSV
        </Button>
      </Box>
      {note && (
        <Typography variant="body2" color="textSecondary" component="div" sx={{ mt: -0.5, mb: 1 }}>
          {note}
        </Typography>
      )}
      {actions && <Box sx={{ display: 'flex', gap: 1, rowGap: 0.75, flexWrap: 'wrap', mb: 1.25 }}>{actions}</Box>}
      {children}
      <Collapse in={tableOpen} unmountOnExit>
        <Box
          tabIndex={0}
          role="region"
          aria-label={`Numbers: ${description}`}
          sx={{ maxHeight: 260, overflow: 'auto', mt: 1 }}
        >
          <NumbersTable table={table} />
        </Box>
      </Collapse>
    </Box>
  );
}

function NumbersTable({ table: { header, rows, format } }: { table: PlotTable }) {
  const isText = (column: number) => rows.some((row) => typeof row[column] === 'string');
  const textColumns = header.map((_label, column) => isText(column));
  return (
    <Box
      component="table"
      sx={{
        borderCollapse: 'collapse',
        fontSize: '0.8125rem',
        '& th, & td': { textAlign: 'right', px: 1.25, py: 0.5, borderBottom: 1, borderColor: 'divider' },
        '& .text': { textAlign: 'left', fontWeight: 400 },
        '& thead th': { color: 'text.secondary', position: 'sticky', top: 0, bgcolor: 'background.paper' },
      }}
    >
      <thead>
        <tr>
          {header.map((label, column) => (
            <th key={label} scope="col" className={textColumns[column] ? 'text' : undefined}>
              {label}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map((row, rowIndex) => (
          <tr key={rowIndex}>
            {row.map((value, column) => {
              const shown =
                typeof value === 'string'
                  ? value
                  : format && value !== null
                    ? format(value, column)
                    : formatNumber(value);
              const className = textColumns[column] ? 'text' : undefined;
              return column === 0 && textColumns[0] ? (
                <th key={column} scope="row" className={className}>
                  {shown}
                </th>
              ) : (
                <td key={column} className={className}>
                  {shown}
                </td>
              );
            })}
          </tr>
        ))}
      </tbody>
    </Box>
  );
}
