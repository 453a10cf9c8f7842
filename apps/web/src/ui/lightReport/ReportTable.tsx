import Table from '@mui/material/Table';
import TableBody from '@mui/material/TableBody';
import TableCell from '@mui/material/TableCell';
import TableContainer from '@mui/material/TableContainer';
import TableHead from '@mui/material/TableHead';
import TableRow from '@mui/material/TableRow';
import type { ReactNode } from 'react';
import { Explained, type Explanation } from '../Quantity';

export interface ReportColumn {
  id: string;
  title: ReactNode;
  unit?: string;
  /** Text stands at the left, numbers at the right. */
  isText?: boolean;
  explanation?: Explanation;
}

/** A table of a report: each column opens to what it means; on a phone it scrolls within itself. */
export function ReportTable({
  label,
  columns,
  children,
}: {
  label: string;
  columns: readonly ReportColumn[];
  children: ReactNode;
}) {
  return (
    <TableContainer tabIndex={0} role="region" aria-label={label}>
      <Table size="small">
        <TableHead>
          <TableRow>
            {columns.map((column) => (
              <TableCell key={column.id} align={column.isText ? 'left' : 'right'} sx={{ verticalAlign: 'bottom' }}>
                {column.explanation ? (
                  <Explained explanation={column.explanation}>{column.title}</Explained>
                ) : (
                  column.title
                )}
                {column.unit && (
                  <>
                    <br />
                    <span style={{ fontWeight: 400 }}>{column.unit}</span>
                  </>
                )}
              </TableCell>
            ))}
          </TableRow>
        </TableHead>
        <TableBody>{children}</TableBody>
      </Table>
    </TableContainer>
  );
}
