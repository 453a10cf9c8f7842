import { useQuery } from '@tanstack/react-query';
import { useNavigate, useParams } from 'react-router-dom';
import { paths } from '../app/paths';
import { semesterQueries } from '../features/semesters/api/semesters';
import { SemesterEditor } from '../features/semesters/components/SemesterEditor';
import { telescopesOf } from '../features/semesters/telescopes';
import { facilityQueries } from '../lib/queries/facilities';
import { useNotices } from '../ui/Notices';
import { PageFrame } from '../ui/PageFrame';
import { Loaded } from '../ui/PageStates';

/** Changes a semester. */
export function Component() {
  const { semesterId = '' } = useParams();
  const query = useQuery(semesterQueries.detail(semesterId));
  const telescopes = useQuery(facilityQueries.telescopes());
  const navigate = useNavigate();
  const announce = useNotices();
  return (
    <PageFrame
      title="Change the semester"
      eyebrow={query.data?.name}
      breadcrumbs={[
        { label: 'Semesters', to: paths.semesters.to() },
        { label: query.data?.name ?? 'Semester', to: paths.semester.to(semesterId) },
      ]}
    >
      <Loaded query={telescopes} what="The telescopes">
        {(list) => (
          <Loaded query={query} what="The semester">
            {(semester) => (
              <SemesterEditor
                key={semester.semesterId}
                semester={semester}
                telescopes={telescopesOf(list)}
                onSaved={(saved, message) => {
                  announce(message);
                  void navigate(paths.semester.to(saved.semesterId));
                }}
                onCancel={() => void navigate(paths.semester.to(semesterId))}
              />
            )}
          </Loaded>
        )}
      </Loaded>
    </PageFrame>
  );
}
