import type { Semester } from '@faintward/contracts/semesters';
import Box from '@mui/material/Box';
import { formatNumber } from '../../../lib/format';
import { TimeDisplay } from '../../../ui/TimeDisplay';

export const stageWords: Record<Semester['stage'], string> = {
  announced: 'announced',
  open: 'open for proposals',
  reviewing: 'in review',
  decided: 'decided',
  observing: 'being observed',
  closed: 'closed',
};

/** Dates, hours and criteria of a semester. */
export function SemesterFacts({ semester }: { semester: Semester }) {
  return (
    <Box
      component="dl"
      sx={{
        display: 'grid',
        gridTemplateColumns: { xs: '1fr', sm: '180px 1fr' },
        columnGap: 2,
        rowGap: 0.75,
        m: 0,
        fontSize: '0.875rem',
        '& dt': { color: 'text.secondary' },
      }}
    >
      <dt>Nights</dt>
      <dd>
        evening of {semester.startsOn} to evening of {semester.endsOn}
      </dd>
      <dt>Call</dt>
      <dd>
        opens <TimeDisplay instant={semester.callOpensAt} siteTimeZone={semester.siteTimeZone} />
        <br />
        closes <TimeDisplay instant={semester.deadlineAt} siteTimeZone={semester.siteTimeZone} />
      </dd>
      <dt>Review</dt>
      <dd>
        {semester.isAnonymised ? 'anonymised' : 'names are shown'}
        {semester.reviewsDueAt && (
          <>
            , due <TimeDisplay instant={semester.reviewsDueAt} siteTimeZone={semester.siteTimeZone} />
          </>
        )}
        {semester.decidedAt ? (
          <>
            <br />
            decided <TimeDisplay instant={semester.decidedAt} siteTimeZone={semester.siteTimeZone} />
          </>
        ) : (
          ''
        )}
      </dd>
      <dt>Hours, dark / grey / bright</dt>
      <dd>
        {semester.telescopes.map((telescope) => (
          <div key={telescope.telescopeId}>
            {telescope.telescopeName}:{' '}
            {(['dark', 'grey', 'bright'] as const)
              .map((moon) => formatNumber(telescope.availableHours[moon], { decimals: 0 }))
              .join(' / ')}{' '}
            h
          </div>
        ))}
      </dd>
      <dt>Criteria</dt>
      <dd>
        {semester.criteria.map((criterion) => (
          <div key={criterion.criterionId}>
            {criterion.title}{' '}
            <Box component="span" sx={{ color: 'text.secondary' }}>
              · weight {criterion.weight}
            </Box>
          </div>
        ))}
      </dd>
    </Box>
  );
}
