import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import { useQuery } from '@tanstack/react-query';
import { Link as RouterLink } from 'react-router-dom';
import { paths } from '../app/paths';
import { semesterQueries } from '../features/semesters/api/semesters';
import { SemesterFacts, stageWords } from '../features/semesters/components/SemesterFacts';
import { EmptyState } from '../ui/EmptyState';
import { Loaded } from '../ui/PageStates';
import { PageFrame } from '../ui/PageFrame';
import { Panel } from '../ui/Panel';

export function Component() {
  const query = useQuery(semesterQueries.list());
  return (
    <PageFrame
      title="Semesters"
      actions={
        <Button variant="contained" component={RouterLink} to={paths.newSemester.to()}>
          Set up a semester
        </Button>
      }
    >
      <Loaded query={query} what="The semesters">
        {({ rows }) =>
          rows.length === 0 ? (
            <Panel>
              <EmptyState title="No semester has been set up yet" />
            </Panel>
          ) : (
            <Stack sx={{ gap: 2 }}>
              {rows.map((semester) => (
                <Panel
                  key={semester.semesterId}
                  title={semester.name}
                  note={stageWords[semester.stage]}
                  actions={
                    <Stack direction="row" sx={{ gap: 1 }}>
                      <Button
                        size="small"
                        component={RouterLink}
                        to={paths.semester.to(semester.semesterId)}
                        aria-label={`Open ${semester.name}`}
                      >
                        Open
                      </Button>
                      <Button
                        size="small"
                        component={RouterLink}
                        to={paths.semesterEdit.to(semester.semesterId)}
                        aria-label={`Change ${semester.name}`}
                      >
                        Change
                      </Button>
                    </Stack>
                  }
                >
                  <SemesterFacts semester={semester} />
                </Panel>
              ))}
            </Stack>
          )
        }
      </Loaded>
    </PageFrame>
  );
}
