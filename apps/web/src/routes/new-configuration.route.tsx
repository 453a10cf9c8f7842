import type { Mode, TelescopeList } from '@faintward/contracts/facilities';
import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useNavigate, useParams } from 'react-router-dom';
import type { z } from 'zod';
import { paths } from '../app/paths';
import { ConfigurationEditor } from '../features/facilities/components/ConfigurationEditor';
import { facilityQueries } from '../lib/queries/facilities';
import { useNotices } from '../ui/Notices';
import { PageFrame } from '../ui/PageFrame';
import { Loaded, NothingHere } from '../ui/PageStates';

/** A new version of a mode's configuration. */
export function Component() {
  const { modeId = '' } = useParams();
  const query = useQuery(facilityQueries.telescopes());
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const announce = useNotices();
  const found = query.data && findMode(query.data, modeId);
  return (
    <PageFrame
      title="A new configuration"
      eyebrow={
        found &&
        `${found.instrumentName}, ${found.mode.name} · configuration ${found.mode.configurationVersion} in force`
      }
      breadcrumbs={[{ label: 'Instruments', to: paths.instruments.to() }]}
    >
      <Loaded query={query} what="The instruments">
        {() =>
          found ? (
            <ConfigurationEditor
              key={modeId}
              mode={found.mode}
              readCurrent={async () =>
                findMode(await queryClient.fetchQuery({ ...facilityQueries.telescopes(), staleTime: 0 }), modeId)?.mode
              }
              onSaved={(version) => {
                announce(`Configuration ${version} of ${found.mode.name} is in force.`);
                void navigate(paths.instruments.to());
              }}
              onCancel={() => void navigate(paths.instruments.to())}
            />
          ) : (
            <NothingHere />
          )
        }
      </Loaded>
    </PageFrame>
  );
}

function findMode(
  list: z.infer<typeof TelescopeList>,
  modeId: string,
): { instrumentName: string; mode: Mode } | undefined {
  for (const telescope of list.rows) {
    for (const instrument of telescope.instruments) {
      const mode = instrument.modes.find((one) => one.modeId === modeId);
      if (mode) return { instrumentName: instrument.name, mode };
    }
  }
  return undefined;
}
