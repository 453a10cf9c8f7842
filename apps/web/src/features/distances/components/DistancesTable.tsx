import type { DistanceRow } from '@faintward/contracts/distances';
import { formatNumber } from '../../../lib/format';
import { DataTable, type TableColumn } from '../../../ui/DataTable';
import { EmptyState } from '../../../ui/EmptyState';
import { RedshiftValue } from '../../../ui/RedshiftValue';
import { distanceQuantities } from '../../../ui/distanceQuantities';

interface NumberedRow extends DistanceRow {
  number: number;
}

const columns: readonly TableColumn<NumberedRow>[] = [
  {
    field: 'redshift',
    headerName: 'Redshift',
    numeric: true,
    width: 110,
    renderCell: ({ row }) => <RedshiftValue redshift={row.redshift} decimals={decimalsOf(row.redshift)} />,
  },
  ...distanceQuantities.map<TableColumn<NumberedRow>>((quantity) => ({
    field: quantity.field,
    headerName: quantity.symbol,
    description: quantity.label,
    unit: quantity.unit,
    numeric: true,
    computed: true,
    width: quantity.format.decimals === undefined ? 118 : 92,
    valueFormatter: (value: number | null) => formatNumber(value, quantity.format),
  })),
];

function decimalsOf(redshift: number): number {
  return Math.min(6, Math.max(2, String(redshift).split('.')[1]?.length ?? 0));
}

/** All redshifts, all quantities. A row opens its sheet. */
export function DistancesTable({ rows, onOpen }: { rows: readonly DistanceRow[]; onOpen: (index: number) => void }) {
  return (
    <DataTable<NumberedRow>
      label="Distances and dimming by redshift"
      what="rows"
      columns={columns}
      rows={rows.map((row, number) => ({ ...row, number }))}
      getRowId={(row) => row.number}
      empty={<EmptyState title="No redshifts yet" />}
      {...(rows.length > 12 ? { height: 480 } : {})}
      grid={{
        onRowClick: ({ row }) => onOpen((row as NumberedRow).number),
        initialState: { pagination: { paginationModel: { pageSize: 100 } } },
      }}
    />
  );
}
