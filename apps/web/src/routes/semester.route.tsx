import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { useQuery } from '@tanstack/react-query';
import { Link as RouterLink, useParams } from 'react-router-dom';
import { paths } from '../app/paths';
import { semesterQueries } from '../features/semesters/api/semesters';
import { SemesterFacts, stageWords } from '../features/semesters/components/SemesterFacts';
import { Loaded } from '../ui/PageStates';
import { PageFrame } from '../ui/PageFrame';
import { PlainText } from '../ui/PlainText';
import { Panel } from '../ui/Panel';

export function Component() {
  const { semesterId = '' } = useParams();
  const query = useQuery(semesterQueries.detail(semesterId));
  return (
    <PageFrame
      title={query.data?.name ?? 'Semester'}
      eyebrow={query.data ? stageWords[query.data.stage] : undefined}
      actions={
        <Button component={RouterLink} to={paths.semesterEdit.to(semesterId)}>
          Change
        </Button>
      }
      breadcrumbs={[{ label: 'Semesters', to: paths.semesters.to() }]}
    >
      <Loaded query={query} what="The semester">
        {(semester) => (
          <Stack sx={{ gap: 3 }}>
            <Panel>
              <SemesterFacts semester={semester} />
            </Panel>
            <Panel title="Call">
              <PlainText text={semester.callText} />
            </Panel>
            <Panel title="Criteria and their scale">
              {semester.criteria.map((criterion) => (
                <section key={criterion.criterionId} style={{ marginBottom: 16 }}>
                  <Typography variant="h4" component="h3">
                    {criterion.title}
                  </Typography>
                  <Typography variant="body2">0: {criterion.anchors.low}</Typography>
                  <Typography variant="body2">5: {criterion.anchors.middle}</Typography>
                  <Typography variant="body2">10: {criterion.anchors.high}</Typography>
                </section>
              ))}
            </Panel>
          </Stack>
        )}
      </Loaded>
    </PageFrame>
  );
}
