import type { BandId } from '@faintward/contracts/light';
import type { LightReport } from '@faintward/contracts/light-report';
import Box from '@mui/material/Box';
import Link from '@mui/material/Link';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { Link as RouterLink } from 'react-router-dom';
import { paths } from '../../app/paths';
import { Note } from '../Note';
import { Panel } from '../Panel';
import { BandsTable } from './BandsTable';
import { CosmologiesTable } from './CosmologiesTable';
import { ImageBlock } from './ImageBlock';
import { KeyFigures } from './KeyFigures';
import { LedgerPlot } from './LedgerPlot';
import { LinesTable } from './LinesTable';
import { SpectrumPlot } from './SpectrumPlot';
import { SuggestionNotes } from './SuggestionNotes';
import { UncertaintyBlock } from './UncertaintyBlock';

export interface LightReportViewProps {
  report: LightReport;
  /** Another band for the light budget. */
  onBandChange: (bandId: BandId) => void;
  /** For a sheet beside a table: without the tables of bands, lines and cosmologies and without suggestions. */
  compact?: boolean;
}

/** What the light of a source does on its way here: cautions first, then numbers, pictures and where they come from. */
export function LightReportView({ report, onBandChange, compact = false }: LightReportViewProps) {
  const { ledger, spectrum, bands, lines, uncertainty, image, cosmologies, suggestions } = report;
  const bandId = ledger?.bandId ?? null;
  const hasSize = image.halfLightRadiusArcsec !== null || image.meanSurfaceBrightnessAbMagPerArcsec2 !== null;
  return (
    <Stack sx={{ gap: compact ? 2 : 3 }}>
      {report.notices.map((notice) => (
        <Note key={`${notice.code} ${notice.message}`} tone={notice.severity}>
          {notice.message}
        </Note>
      ))}
      <Panel>
        <KeyFigures report={report} />
      </Panel>
      {ledger && ledger.steps.length > 0 && (
        <Panel>
          <LedgerPlot
            steps={ledger.steps}
            title={`Light budget in ${ledger.label}`}
            what={`Light budget in ${ledger.label}`}
            note={
              ledger.lineFluxErgSCm2 === null
                ? undefined
                : 'Of the line’s flux, spread over the band. Losses run right, gains left.'
            }
            reason={ledger.reason?.message ?? null}
            aperture={ledger.aperture}
          />
        </Panel>
      )}
      {spectrum && (
        <Panel>
          <SpectrumPlot
            spectrum={spectrum}
            bands={bands}
            lines={lines}
            atmosphere={report.atmosphere}
            bandId={bandId}
            onBandChange={onBandChange}
          />
          <Typography variant="body2" color="textSecondary" sx={{ mt: 1 }}>
            Spectrum: {spectrum.source}
          </Typography>
        </Panel>
      )}
      {!compact && bands.length > 0 && (
        <Panel title="Light in each band" note="Above the atmosphere" flush>
          <BandsTable bands={bands} chosen={bandId} onChoose={onBandChange} />
        </Panel>
      )}
      {!compact && lines.length > 0 && (
        <Panel title="Lines as they are observed" flush>
          <LinesTable lines={lines} />
        </Panel>
      )}
      {uncertainty && (
        <Panel title="What is uncertain">
          <UncertaintyBlock uncertainty={uncertainty} bandLabel={ledger?.label ?? null} />
        </Panel>
      )}
      {(hasSize || !compact) && (
        <Panel title={hasSize ? 'Size and surface brightness' : 'Surface brightness'}>
          <ImageBlock image={image} distances={report.distances} hasSize={hasSize} />
        </Panel>
      )}
      {!compact && cosmologies.length > 0 && (
        <Panel title="In each cosmology" note={`Against ${report.cosmologyTitle}`} flush>
          <CosmologiesTable rows={cosmologies} />
        </Panel>
      )}
      {!compact && suggestions.length > 0 && (
        <Panel
          title="Suggestions, not measurements"
          note="What is typical at this redshift, from the literature. None of it is in the numbers above."
        >
          <SuggestionNotes suggestions={suggestions} />
        </Panel>
      )}
      <Foot report={report} />
    </Stack>
  );
}

function Foot({ report }: { report: LightReport }) {
  return (
    <Typography variant="body2" color="textSecondary" component="div">
      {report.cosmologyTitle}, engine {report.engineVersion},{' '}
      <Link component={RouterLink} to={paths.sources.to()} underline="always">
        reference data <code>{report.referenceDataVersion.slice(0, 12)}</code>
      </Link>
      , inputs{' '}
      <Box component="code" sx={{ overflowWrap: 'anywhere' }}>
        {report.inputHash.slice(0, 12)}
      </Box>
      .
    </Typography>
  );
}
