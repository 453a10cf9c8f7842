import type { CheckFinding, CheckReport } from '@faintward/contracts/submissions';
import Box from '@mui/material/Box';
import Link from '@mui/material/Link';
import { Link as RouterLink } from 'react-router-dom';
import { paths } from '../../../app/paths';
import { counted } from '../../../lib/format';
import { EmptyState } from '../../../ui/EmptyState';
import { Panel } from '../../../ui/Panel';

/** What stands against submitting, each a link to where it is mended. */
export function CheckFindings({ proposalId, report }: { proposalId: string; report: CheckReport }) {
  if (report.findings.length === 0) {
    return (
      <Panel>
        <EmptyState title="The checks found nothing to mend" />
      </Panel>
    );
  }
  const blocking = report.findings.filter((finding) => finding.severity === 'blocking');
  const warnings = report.findings.filter((finding) => finding.severity === 'warning');
  return (
    <>
      {blocking.length > 0 && (
        <FindingList
          proposalId={proposalId}
          findings={blocking}
          title={`${counted(blocking.length, 'thing')} to mend first`}
          note="Each opens where it is mended."
        />
      )}
      {warnings.length > 0 && (
        <FindingList
          proposalId={proposalId}
          findings={warnings}
          title={`${counted(warnings.length, 'warning')}`}
          note="These do not keep you from submitting."
        />
      )}
    </>
  );
}

function FindingList({
  proposalId,
  findings,
  title,
  note,
}: {
  proposalId: string;
  findings: readonly CheckFinding[];
  title: string;
  note: string;
}) {
  return (
    <Panel title={title} note={note} flush>
      <Box component="ul" sx={{ listStyle: 'none', m: 0, p: 0 }}>
        {findings.map((finding, index) => (
          <Box
            component="li"
            key={`${finding.code} ${index}`}
            sx={{
              display: 'flex',
              gap: 1.5,
              borderTop: 1,
              borderColor: 'divider',
              px: { xs: 2, md: 2.5 },
              py: 1.1,
              overflowWrap: 'anywhere',
            }}
          >
            <Box
              component="span"
              aria-hidden
              sx={{ color: finding.severity === 'blocking' ? 'error.main' : 'warning.main', width: 16, flexShrink: 0 }}
            >
              {finding.severity === 'blocking' ? '✕' : '▲'}
            </Box>
            <Box sx={{ minWidth: 0 }}>
              <Link
                component={RouterLink}
                to={
                  paths.proposalSection.to(proposalId, finding.section) +
                  (finding.targetId ? `?target=${finding.targetId}` : '')
                }
              >
                {finding.message}
              </Link>
            </Box>
          </Box>
        ))}
      </Box>
    </Panel>
  );
}
