import { useQuery } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { paths } from '../app/paths';
import { semesterQueries } from '../features/semesters/api/semesters';
import { SemesterEditor } from '../features/semesters/components/SemesterEditor';
import { telescopesOf } from '../features/semesters/telescopes';
import { facilityQueries } from '../lib/queries/facilities';
import { useNotices } from '../ui/Notices';
import { PageFrame } from '../ui/PageFrame';
import { Loaded } from '../ui/PageStates';

/** Sets up a semester. It begins with the criteria and hours of the newest one. */
export function Component() {
  const semesters = useQuery(semesterQueries.list());
  const telescopes = useQuery(facilityQueries.telescopes());
  const navigate = useNavigate();
  const announce = useNotices();
  return (
    <PageFrame title="A new semester" breadcrumbs={[{ label: 'Semesters', to: paths.semesters.to() }]}>
      <Loaded query={telescopes} what="The telescopes">
        {(list) => (
          <Loaded query={semesters} what="The semesters">
            {({ rows }) => (
              <SemesterEditor
                newest={rows[0]}
                telescopes={telescopesOf(list)}
                onSaved={(saved, message) => {
                  announce(message);
                  void navigate(paths.semester.to(saved.semesterId));
                }}
                onCancel={() => void navigate(paths.semesters.to())}
              />
            )}
          </Loaded>
        )}
      </Loaded>
    </PageFrame>
  );
}
