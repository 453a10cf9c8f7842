import type { OutgoingMailEntry } from '@faintward/contracts/people';
import { useQuery } from '@tanstack/react-query';
import { administrationQueries } from '../features/administration/api/administration';
import { AdministrationTabs } from '../features/administration/components/AdministrationTabs';
import { useTableParams } from '../lib/useTableParams';
import { DataTable, type TableColumn } from '../ui/DataTable';
import { EmptyState } from '../ui/EmptyState';
import { PageFrame } from '../ui/PageFrame';
import { TimeDisplay } from '../ui/TimeDisplay';

const columns: TableColumn<OutgoingMailEntry>[] = [
  {
    field: 'createdAt',
    headerName: 'Written',
    width: 180,
    renderCell: ({ row }) => <TimeDisplay instant={row.createdAt} short />,
  },
  { field: 'to', headerName: 'To', flex: 1, minWidth: 200, sortable: false },
  { field: 'subject', headerName: 'Subject', flex: 1.5, minWidth: 220, sortable: false },
  { field: 'state', headerName: 'State', width: 100, sortable: false },
  { field: 'attempts', headerName: 'Tries', numeric: true, width: 80, sortable: false },
  {
    field: 'sentAt',
    headerName: 'Sent',
    width: 180,
    sortable: false,
    renderCell: ({ row }) => <TimeDisplay instant={row.sentAt} short />,
  },
  { field: 'lastError', headerName: 'Last error', flex: 1, minWidth: 180, sortable: false },
];

export function Component() {
  const params = useTableParams({ sort: 'createdAt', order: 'desc' });
  const query = useQuery(administrationQueries.mail(params));
  return (
    <PageFrame title="Administration" below={<AdministrationTabs />}>
      <DataTable<OutgoingMailEntry>
        label="Outgoing mail"
        what="letters"
        columns={columns}
        rows={query.data?.rows}
        rowCount={query.data?.rowCount}
        getRowId={(row) => row.mailId}
        params={params}
        error={query.error}
        isFetching={query.isFetching}
        onRetry={() => void query.refetch()}
        empty={<EmptyState title="No mail has been written yet" />}
      />
    </PageFrame>
  );
}
