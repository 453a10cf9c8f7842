import Box from '@mui/material/Box';
import { useQuery } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { paths } from '../app/paths';
import { reviewQueries } from '../features/reviews/api/reviews';
import { DeclareConflict } from '../features/reviews/components/DeclareConflict';
import { ReviewForm } from '../features/reviews/components/ReviewForm';
import { SubmittedProposal } from '../features/reviews/components/SubmittedProposal';
import { PageFrame } from '../ui/PageFrame';
import { Loaded } from '../ui/PageStates';

/** The proposal beside the scoring form. */
export function Component() {
  const proposalId = useParams()['proposalId'] ?? '';
  const query = useQuery(reviewQueries.detail(proposalId));
  const review = query.data;
  return (
    <PageFrame
      title={review?.content.title ?? 'Review'}
      breadcrumbs={[{ label: 'Reading list', to: paths.reviews.to() }]}
      eyebrow={
        review && (
          <>
            {review.label} · {review.panelName} · {review.semesterName}
            {review.isAnonymised && ' · without names'}
            {review.isLead && ' · you are lead reviewer'}
          </>
        )
      }
      actions={review?.canEdit && <DeclareConflict proposalId={proposalId} />}
    >
      <Loaded query={query} what="The proposal">
        {(data) => (
          <Box
            sx={{
              display: 'grid',
              gridTemplateColumns: { xs: 'minmax(0, 1fr)', lg: 'minmax(0, 1fr) 420px' },
              gap: 2.25,
              alignItems: 'start',
            }}
          >
            <SubmittedProposal content={data.content} />
            <Box
              sx={{
                position: { lg: 'sticky' },
                top: 16,
                maxHeight: { lg: 'calc(100vh - 32px)' },
                overflow: { lg: 'auto' },
              }}
            >
              <ReviewForm key={data.proposalId} review={data} />
            </Box>
          </Box>
        )}
      </Loaded>
    </PageFrame>
  );
}
