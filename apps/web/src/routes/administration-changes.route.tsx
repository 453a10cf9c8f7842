import type { AuditEntry } from '@faintward/contracts/people';
import { useQuery } from '@tanstack/react-query';
import { administrationQueries } from '../features/administration/api/administration';
import { AdministrationTabs } from '../features/administration/components/AdministrationTabs';
import { useTableParams } from '../lib/useTableParams';
import { DataTable, type TableColumn } from '../ui/DataTable';
import { EmptyState } from '../ui/EmptyState';
import { PageFrame } from '../ui/PageFrame';
import { TimeDisplay } from '../ui/TimeDisplay';

const columns: TableColumn<AuditEntry>[] = [
  { field: 'at', headerName: 'When', width: 180, renderCell: ({ row }) => <TimeDisplay instant={row.at} short /> },
  {
    field: 'personName',
    headerName: 'Who',
    width: 200,
    sortable: false,
    valueFormatter: (value: string | null) => value ?? 'the application',
  },
  { field: 'subject', headerName: 'What', width: 140, sortable: false },
  { field: 'action', headerName: 'Done', width: 140, sortable: false },
  { field: 'summary', headerName: 'Change', flex: 1, minWidth: 260, sortable: false },
];

export function Component() {
  const params = useTableParams({ sort: 'at', order: 'desc' });
  const query = useQuery(administrationQueries.changes(params));
  return (
    <PageFrame title="Administration" below={<AdministrationTabs />}>
      <DataTable<AuditEntry>
        label="Audit trail"
        what="changes"
        columns={columns}
        rows={query.data?.rows}
        rowCount={query.data?.rowCount}
        getRowId={(row) => row.changeId}
        params={params}
        error={query.error}
        isFetching={query.isFetching}
        onRetry={() => void query.refetch()}
        empty={<EmptyState title="Nothing has been changed yet" />}
      />
    </PageFrame>
  );
}
