import { useQuery } from '@tanstack/react-query';
import Button from '@mui/material/Button';
import { Link as RouterLink, useParams } from 'react-router-dom';
import { paths } from '../app/paths';
import { panelQueries } from '../features/panels/api/panels';
import { AssignmentView } from '../features/panels/components/AssignmentView';
import { PageFrame } from '../ui/PageFrame';
import { Loaded } from '../ui/PageStates';

/** A panel for its chair: members, proposals, who reads what. */
export function Component() {
  const panelId = useParams()['panelId'] ?? '';
  const query = useQuery(panelQueries.detail(panelId));
  return (
    <PageFrame
      title={query.data ? `Panel · ${query.data.name}` : 'Panel'}
      eyebrow={query.data?.semesterName}
      actions={
        <Button component={RouterLink} to={paths.ranking.to(panelId)} variant="contained">
          To the ranking
        </Button>
      }
    >
      <Loaded query={query} what="The panel">
        {(panel) => <AssignmentView panel={panel} />}
      </Loaded>
    </PageFrame>
  );
}
