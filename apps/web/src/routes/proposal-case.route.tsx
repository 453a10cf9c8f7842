import Stack from '@mui/material/Stack';
import { useQuery } from '@tanstack/react-query';
import { proposalQueries } from '../features/proposals/api/proposals';
import { CaseSectionEditor } from '../features/proposals/components/CaseSectionEditor';
import { ProposalSettings } from '../features/proposals/components/ProposalSettings';
import { ProposalSummaryView } from '../features/proposals/components/ProposalSummaryView';
import { useProposal } from '../features/proposals/components/useProposal';
import { Loaded } from '../ui/PageStates';

/** Title and summary, and the text of the case. */
export function Component() {
  const proposal = useProposal();
  const { proposalId, abilities } = proposal;
  const sections = useQuery(proposalQueries.caseSections(proposalId));
  const choices = useQuery(proposalQueries.choices(proposalId));
  return (
    <Stack sx={{ gap: 2.25, maxWidth: 900 }}>
      {abilities.canEditEverything ? (
        <Loaded query={choices} what="The panels and partners">
          {(data) => <ProposalSettings proposal={proposal} choices={data} />}
        </Loaded>
      ) : (
        <ProposalSummaryView proposal={proposal} />
      )}
      <Loaded query={sections} what="The text">
        {(list) => (
          <Stack sx={{ gap: 2.25 }}>
            {list.rows.map((section) => (
              <CaseSectionEditor
                key={section.sectionId}
                proposalId={proposalId}
                section={section}
                canEdit={abilities.canEditEverything}
              />
            ))}
          </Stack>
        )}
      </Loaded>
    </Stack>
  );
}
