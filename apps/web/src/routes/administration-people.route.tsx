import type { PersonRecord } from '@faintward/contracts/people';
import Checkbox from '@mui/material/Checkbox';
import { useQuery } from '@tanstack/react-query';
import { useMemo, useState } from 'react';
import { administrationQueries, useChangeRoles } from '../features/administration/api/administration';
import { AdministrationTabs } from '../features/administration/components/AdministrationTabs';
import { useTableParams } from '../lib/useTableParams';
import { ConfirmDialog } from '../ui/ConfirmDialog';
import { DataTable, type TableColumn } from '../ui/DataTable';
import { EmptyState } from '../ui/EmptyState';
import { PageFrame } from '../ui/PageFrame';
import { TimeDisplay } from '../ui/TimeDisplay';

type Role = 'isStaff' | 'isAdministrator';
const roleWords: Record<Role, string> = { isStaff: 'observatory staff', isAdministrator: 'administrator' };

export function Component() {
  const params = useTableParams({ sort: 'name' });
  const query = useQuery(administrationQueries.people(params));
  const change = useChangeRoles();
  const [asked, setAsked] = useState<{ person: PersonRecord; role: Role } | null>(null);
  const columns = useMemo<TableColumn<PersonRecord>[]>(() => {
    const role = (field: Role, headerName: string): TableColumn<PersonRecord> => ({
      field,
      headerName,
      width: 120,
      sortable: false,
      renderCell: ({ row }) => (
        <Checkbox
          checked={row[field]}
          onChange={() => setAsked({ person: row, role: field })}
          slotProps={{ input: { 'aria-label': `${row.name}: ${roleWords[field]}` } }}
        />
      ),
    });
    return [
      { field: 'name', headerName: 'Name', flex: 1, minWidth: 160 },
      { field: 'email', headerName: 'E-mail', flex: 1.2, minWidth: 200 },
      { field: 'institutionName', headerName: 'Institution', flex: 1.2, minWidth: 160, sortable: false },
      {
        field: 'panelNames',
        headerName: 'Panels',
        flex: 1.2,
        minWidth: 180,
        sortable: false,
        // A panel has one name in every semester.
        valueFormatter: (value: string[]) => [...new Set(value)].join(', '),
      },
      role('isStaff', 'Staff'),
      role('isAdministrator', 'Administrator'),
      {
        field: 'lastSignInAt',
        headerName: 'Last signed in',
        width: 170,
        sortable: false,
        renderCell: ({ value }) => <TimeDisplay instant={value as string | null} short />,
      },
    ];
  }, []);
  const grants = asked && !asked.person[asked.role];
  return (
    <PageFrame title="Administration" below={<AdministrationTabs />}>
      <DataTable<PersonRecord>
        label="People and roles"
        what="people"
        columns={columns}
        rows={query.data?.rows}
        rowCount={query.data?.rowCount}
        getRowId={(row) => row.personId}
        params={params}
        error={query.error}
        isFetching={query.isFetching}
        onRetry={() => void query.refetch()}
        searchLabel="Search names and e-mail"
        empty={<EmptyState title="Nobody has signed up yet" />}
      />
      <ConfirmDialog
        open={asked !== null}
        title={grants ? 'Give this role?' : 'Take this role away?'}
        confirmLabel={grants ? 'Give the role' : 'Take it away'}
        destructive={!grants}
        pending={change.isPending}
        error={change.error}
        onCancel={() => {
          change.reset();
          setAsked(null);
        }}
        onConfirm={() => {
          if (!asked) return;
          change.mutate(
            { person: asked.person, roles: { [asked.role]: !asked.person[asked.role] } },
            { onSuccess: () => setAsked(null) },
          );
        }}
      >
        {asked && `${asked.person.name} ${grants ? 'becomes' : 'will no longer be'} ${roleWords[asked.role]}.`}
      </ConfirmDialog>
    </PageFrame>
  );
}
