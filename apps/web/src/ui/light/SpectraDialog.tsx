import type { StoredSpectrum } from '@faintward/contracts/light-report';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Dialog from '@mui/material/Dialog';
import DialogActions from '@mui/material/DialogActions';
import DialogContent from '@mui/material/DialogContent';
import DialogTitle from '@mui/material/DialogTitle';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import useMediaQuery from '@mui/material/useMediaQuery';
import { useQuery } from '@tanstack/react-query';
import { useId } from 'react';
import { counted, formatNumber } from '../../lib/format';
import { EmptyState } from '../EmptyState';
import { Note } from '../Note';
import { Loaded } from '../PageStates';
import { ProblemDisplay } from '../ProblemDisplay';
import { lightQueries, useSpectrumMutations } from './lightQueries';
import { NewSpectrumForm } from './NewSpectrumForm';

/** The spectra of a proposal: what they are, who uses them, one more, one less. */
export function SpectraDialog({
  proposalId,
  open,
  canEdit,
  onClose,
  onUse,
}: {
  proposalId: string;
  open: boolean;
  canEdit: boolean;
  onClose: () => void;
  onUse: (spectrumId: string) => void;
}) {
  const id = useId();
  const isSmall = useMediaQuery('(max-width: 599.95px)');
  const spectra = useQuery({ ...lightQueries.spectra(proposalId), enabled: open });
  const { remove } = useSpectrumMutations(proposalId);
  return (
    <Dialog open={open} onClose={onClose} aria-labelledby={id} maxWidth="md" fullWidth fullScreen={isSmall}>
      <DialogTitle id={id}>Spectra of this proposal</DialogTitle>
      <DialogContent>
        <Loaded query={spectra} what="The spectra">
          {({ rows }) =>
            rows.length === 0 ? (
              <EmptyState title="No spectra yet">
                A table of wavelength and flux density, put into the rest frame once and then used for any target.
              </EmptyState>
            ) : (
              <Box component="ul" sx={{ listStyle: 'none', m: 0, p: 0 }}>
                {rows.map((row) => (
                  <SpectrumRow
                    key={row.spectrumId}
                    spectrum={row}
                    canEdit={canEdit}
                    isRemoving={remove.isPending && remove.variables === row.spectrumId}
                    onUse={() => onUse(row.spectrumId)}
                    onRemove={() => remove.mutate(row.spectrumId)}
                  />
                ))}
              </Box>
            )
          }
        </Loaded>
        {remove.error && (
          <Box sx={{ mt: 1.5 }}>
            <ProblemDisplay error={remove.error} what="Not removed" />
          </Box>
        )}
        {canEdit && (
          <Box sx={{ mt: 3 }}>
            <NewSpectrumForm proposalId={proposalId} />
          </Box>
        )}
      </DialogContent>
      <DialogActions sx={{ px: 3, pb: 2 }}>
        <Button variant="text" onClick={onClose}>
          Close
        </Button>
      </DialogActions>
    </Dialog>
  );
}

function SpectrumRow({
  spectrum,
  canEdit,
  isRemoving,
  onUse,
  onRemove,
}: {
  spectrum: StoredSpectrum;
  canEdit: boolean;
  isRemoving: boolean;
  onUse: () => void;
  onRemove: () => void;
}) {
  const isUsed = spectrum.usedByCount > 0;
  const reasonId = useId();
  return (
    <Box component="li" sx={{ borderTop: 1, borderColor: 'divider', py: 1.25 }}>
      <Stack direction="row" sx={{ gap: 1.5, alignItems: 'center', flexWrap: 'wrap' }}>
        <Box sx={{ flex: '1 1 260px', minWidth: 0, overflowWrap: 'anywhere' }}>
          <strong>{spectrum.name}</strong>
          <Typography variant="body2" color="textSecondary">
            {formatNumber(spectrum.restLowNm)} to {formatNumber(spectrum.restHighNm)} nm in the rest frame ·{' '}
            {counted(spectrum.pointCount, 'point')}
            {spectrum.observedAtRedshift > 0 && ` · observed at z ${formatNumber(spectrum.observedAtRedshift)}`}
            {spectrum.source && ` · ${spectrum.source}`}
          </Typography>
          <Typography variant="body2" color="textSecondary" id={reasonId}>
            {isUsed
              ? `Used by ${counted(spectrum.usedByCount, 'target')}: it can be removed once none uses it.`
              : 'Used by no target.'}
          </Typography>
        </Box>
        {canEdit && (
          <>
            <Button size="small" onClick={onUse}>
              Use
            </Button>
            <Button
              size="small"
              variant="text"
              color="error"
              disabled={isUsed}
              aria-describedby={reasonId}
              loading={isRemoving}
              onClick={onRemove}
            >
              Remove
            </Button>
          </>
        )}
      </Stack>
      {spectrum.notices.map((notice) => (
        <Box key={`${notice.code} ${notice.message}`} sx={{ mt: 0.75 }}>
          <Note tone={notice.severity}>{notice.message}</Note>
        </Box>
      ))}
    </Box>
  );
}
