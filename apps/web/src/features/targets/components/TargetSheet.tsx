import type { DistancesResponse } from '@faintward/contracts/distances';
import type { BandId } from '@faintward/contracts/light';
import type { LightReport } from '@faintward/contracts/light-report';
import type { Target } from '@faintward/contracts/targets';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { useId, type ReactNode } from 'react';
import { bySeverity } from '../../../lib/bySeverity';
import { formatNumber } from '../../../lib/format';
import { Note } from '../../../ui/Note';
import { Loaded, SkeletonBlock, type QueryState } from '../../../ui/PageStates';
import { Panel } from '../../../ui/Panel';
import { PlainText } from '../../../ui/PlainText';
import { RedshiftWithUncertainty } from '../../../ui/light/RedshiftWithUncertainty';
import { LightReportView } from '../../../ui/lightReport/LightReportView';
import { redshiftDecimals } from '../cells';
import { SourceForm } from './SourceForm';
import { DistanceFigures, HoursUp } from './TargetFigures';

export interface TargetSheetProps {
  proposalId: string;
  target: Target;
  /** The conventional model beside the proposal's. */
  beside: QueryState<DistancesResponse>;
  canEdit: boolean;
  /** Why nothing can be changed. */
  readOnlyReason: string;
  /** What of its light arrives. */
  report: QueryState<LightReport>;
  /** Another band for its light budget. */
  onBandChange: (bandId: BandId) => void;
  /** Its observations with their light budgets. */
  observations: ReactNode;
  /** Its last changes. */
  history: ReactNode;
}

/** Where a target is and when its light set out, in one line under its name. */
export function TargetLine({ target }: { target: Target }) {
  const { ageGyr } = target.computed;
  return (
    <Box
      sx={{
        display: 'flex',
        columnGap: 2.5,
        rowGap: 0.25,
        flexWrap: 'wrap',
        alignItems: 'center',
        fontSize: '0.875rem',
        mt: -1.75,
        mb: 2.5,
      }}
    >
      <Typography variant="figure" component="span">
        {target.rightAscensionText} {target.declinationText}
      </Typography>
      <Box component="span">
        z{'\u2002'}
        <RedshiftWithUncertainty target={target} decimals={redshiftDecimals(target.redshift)} />
        {target.redshiftKind !== 'spectroscopic' && `, ${target.redshiftKind}`}
      </Box>
      {ageGyr !== null && (
        <Box component="span" sx={{ color: 'text.secondary' }}>
          the light set out when the Universe was {formatNumber(ageGyr, { significant: 3 })}
          {'\u202f'}Gyr old
        </Box>
      )}
    </Box>
  );
}

/** Everything about one target: what is known of it beside what follows from that. */
export function TargetSheet(props: TargetSheetProps) {
  const { proposalId, target, beside, canEdit, readOnlyReason, report, onBandChange, observations, history } = props;
  const { computed } = target;
  const formId = useId();
  return (
    <Box
      sx={{
        display: 'grid',
        gap: 2.5,
        gridTemplateColumns: { xs: 'minmax(0, 1fr)', md: 'minmax(340px, 4fr) minmax(0, 8fr)' },
        alignItems: 'start',
      }}
    >
      <Stack id={formId} sx={{ gap: 2.5, minWidth: 0, order: { xs: 2, md: 1 }, scrollMarginTop: 72 }}>
        <Panel
          title="Describe its light"
          note={canEdit ? 'Saved by itself; the numbers beside it follow.' : readOnlyReason}
        >
          <SourceForm key={target.targetId} proposalId={proposalId} target={target} canEdit={canEdit} />
        </Panel>
        {target.notes && (
          <Panel title="Notes">
            <PlainText text={target.notes} />
          </Panel>
        )}
      </Stack>
      <Stack sx={{ gap: 2.5, minWidth: 0, order: { xs: 1, md: 2 } }}>
        <Button href={`#${formId}`} sx={{ display: { md: 'none' }, alignSelf: 'flex-start' }}>
          {canEdit ? 'Describe its light' : 'Its light as described'}
        </Button>
        <TargetNotices target={target} report={report.data} />
        <Loaded
          query={report}
          what="What arrives of its light"
          skeleton={<SkeletonBlock label="What arrives of its light: loading" lines={12} />}
        >
          {(arriving) => (
            // What is typical is offered in the form, where it can be taken up.
            <LightReportView report={{ ...arriving, suggestions: [] }} onBandChange={onBandChange} />
          )}
        </Loaded>
        <Panel title="Distances and times" note="In the cosmology of this proposal, beside the conventional one.">
          <DistanceFigures target={target} beside={beside} />
        </Panel>
        <Panel title="Observations">{observations}</Panel>
        {computed.upHoursByMonth.length > 0 && (
          <Panel title={`Up${computed.upSummary ? `: ${computed.upSummary}` : ''}`}>
            <HoursUp target={target} />
          </Panel>
        )}
        <Panel title="Changes of this target" note="Newest first." flush>
          {history}
        </Panel>
      </Stack>
    </Box>
  );
}

/** What is to be heeded of the target itself; what its report says of the light is said there. */
function TargetNotices({ target, report }: { target: Target; report: LightReport | undefined }) {
  const said = new Set(report?.notices.map((notice) => notice.message));
  const own = bySeverity(target.computed.notices).filter((notice) => !said.has(notice.message));
  if (own.length === 0) return null;
  return (
    <Stack sx={{ gap: 1 }}>
      {own.map((notice) => (
        <Note key={`${notice.code} ${notice.message}`} tone={notice.severity}>
          {notice.message}
        </Note>
      ))}
    </Stack>
  );
}
