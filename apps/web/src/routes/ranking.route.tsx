import { useQuery } from '@tanstack/react-query';
import Button from '@mui/material/Button';
import { Link as RouterLink, useParams } from 'react-router-dom';
import { paths } from '../app/paths';
import { panelQueries } from '../features/panels/api/panels';
import { RankingActions, RankingView } from '../features/panels/components/RankingView';
import { PageFrame } from '../ui/PageFrame';
import { Loaded } from '../ui/PageStates';

/** The chair's ranking grid. */
export function Component() {
  const panelId = useParams()['panelId'] ?? '';
  const query = useQuery(panelQueries.ranking(panelId));
  return (
    <PageFrame
      title={query.data ? `Ranking · ${query.data.panelName}` : 'Ranking'}
      eyebrow={query.data?.semesterName}
      actions={
        <>
          <Button component={RouterLink} to={paths.panel.to(panelId)} variant="text">
            Panel and assignments
          </Button>
          {query.data && <RankingActions ranking={query.data} />}
        </>
      }
    >
      <Loaded query={query} what="The ranking">
        {(ranking) => <RankingView ranking={ranking} />}
      </Loaded>
    </PageFrame>
  );
}
