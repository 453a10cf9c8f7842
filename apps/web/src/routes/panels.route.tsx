import type { Me } from '@faintward/contracts/accounts';
import type { Semester } from '@faintward/contracts/semesters';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { useQuery } from '@tanstack/react-query';
import { Link as RouterLink } from 'react-router-dom';
import { paths } from '../app/paths';
import { semesterQueries } from '../features/semesters/api/semesters';
import { stageWords } from '../features/semesters/components/SemesterFacts';
import { useMe } from '../lib/useMe';
import { EmptyState } from '../ui/EmptyState';
import { PageFrame } from '../ui/PageFrame';
import { Loaded } from '../ui/PageStates';
import { Panel } from '../ui/Panel';

/** The panels that a person sits on, semester by semester: those in review first, then the newest. */
export function Component() {
  const me = useMe();
  const query = useQuery(semesterQueries.list());
  return (
    <PageFrame title="Panels">
      <Loaded query={query} what="The semesters">
        {({ rows }) => {
          const groups = panelsBySemester(me.panels, rows);
          return groups.length === 0 ? (
            <EmptyState title="You are on no panel">The administrator names the members of each panel.</EmptyState>
          ) : (
            <Stack sx={{ gap: 2.25 }}>
              {groups.map((group) => (
                <Panel
                  key={group.semesterId}
                  title={group.semesterName}
                  note={group.stage && stageWords[group.stage]}
                  flush
                >
                  <Box component="ul" sx={{ listStyle: 'none', m: 0, p: 0 }}>
                    {group.panels.map((panel) => (
                      <PanelEntry key={panel.panelId} panel={panel} />
                    ))}
                  </Box>
                </Panel>
              ))}
            </Stack>
          );
        }}
      </Loaded>
    </PageFrame>
  );
}

type PanelOfMe = Me['panels'][number];

function PanelEntry({ panel }: { panel: PanelOfMe }) {
  return (
    <Box
      component="li"
      sx={{
        display: 'flex',
        flexWrap: 'wrap',
        gap: 1.25,
        alignItems: 'center',
        borderTop: 1,
        borderColor: 'divider',
        px: { xs: 2, md: 2.5 },
        py: 1.25,
      }}
    >
      <Box sx={{ flex: '1 1 240px', minWidth: 0 }}>
        <strong>{panel.panelName}</strong>
        <Typography variant="body2" color="textSecondary">
          you are {panel.role === 'chair' ? 'the chair' : 'a member'}
        </Typography>
      </Box>
      {panel.role === 'chair' ? (
        <>
          <Button
            component={RouterLink}
            to={paths.panel.to(panel.panelId)}
            aria-label={`Assignments of ${panel.panelName}, ${panel.semesterName}`}
          >
            Assignments
          </Button>
          <Button
            component={RouterLink}
            to={paths.ranking.to(panel.panelId)}
            variant="contained"
            aria-label={`Ranking of ${panel.panelName}, ${panel.semesterName}`}
          >
            Ranking
          </Button>
        </>
      ) : (
        <Button
          component={RouterLink}
          to={paths.reviews.to()}
          aria-label={`Reading list, with ${panel.panelName}, ${panel.semesterName}`}
        >
          Reading list
        </Button>
      )}
    </Box>
  );
}

interface SemesterGroup {
  semesterId: string;
  semesterName: string;
  stage: Semester['stage'] | undefined;
  panels: PanelOfMe[];
}

/** Semesters in review first, then by their nights, the newest first; panels by name. */
export function panelsBySemester(panels: readonly PanelOfMe[], semesters: readonly Semester[]): SemesterGroup[] {
  const stored = new Map(semesters.map((semester) => [semester.semesterId, semester]));
  const groups = new Map<string, SemesterGroup>();
  for (const panel of panels) {
    const group = groups.get(panel.semesterId) ?? {
      semesterId: panel.semesterId,
      semesterName: panel.semesterName,
      stage: stored.get(panel.semesterId)?.stage,
      panels: [],
    };
    group.panels.push(panel);
    groups.set(panel.semesterId, group);
  }
  const startOf = ({ semesterId }: SemesterGroup) => stored.get(semesterId)?.startsOn ?? '';
  return [...groups.values()]
    .map((group) => ({ ...group, panels: group.panels.toSorted((a, b) => a.panelName.localeCompare(b.panelName)) }))
    .toSorted(
      (a, b) =>
        Number(b.stage === 'reviewing') - Number(a.stage === 'reviewing') || startOf(b).localeCompare(startOf(a)),
    );
}
