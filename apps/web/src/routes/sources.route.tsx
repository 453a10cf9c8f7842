import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { useQuery } from '@tanstack/react-query';
import { sourceQueries } from '../features/sources/api/sources';
import { ReferenceDataFiles } from '../features/sources/components/ReferenceDataFiles';
import { downloadText, toCsv } from '../lib/csv';
import { counted } from '../lib/format';
import { EmptyState } from '../ui/EmptyState';
import { PageFrame } from '../ui/PageFrame';
import { Loaded } from '../ui/PageStates';
import { Panel } from '../ui/Panel';

/** What the numbers are made with, and where each of it comes from. */
export function Component() {
  const query = useQuery(sourceQueries.referenceData());
  return (
    <PageFrame
      title="Sources"
      eyebrow="Reference data in use"
      actions={
        <Button
          disabled={!query.data}
          onClick={() =>
            query.data &&
            downloadText(
              'reference-data.csv',
              toCsv(
                ['file', 'title', 'source', 'provenance', 'units', 'licence', 'content_hash'],
                query.data.rows.map((row) => [
                  row.file,
                  row.title,
                  row.source,
                  row.provenance,
                  row.units,
                  row.licence,
                  row.contentHash,
                ]),
              ),
            )
          }
        >
          Download CSV
        </Button>
      }
    >
      <Loaded query={query} what="The reference data">
        {(list) =>
          list.rows.length === 0 ? (
            <EmptyState title="No reference data are in use" />
          ) : (
            <Stack sx={{ gap: 2.5 }}>
              <Typography variant="reading" sx={{ maxWidth: 720 }}>
                Bands, lines, spectra and relations are read from files that are kept with the software, each with its
                source. Their version stands under every result: two results with the same version, engine and inputs
                are the same to the last digit. Formulas have their sources where they are used: open any number.
              </Typography>
              <Panel
                title={counted(list.rows.length, 'file')}
                note={
                  <>
                    Version <code>{list.version}</code>
                  </>
                }
                flush
              >
                <ReferenceDataFiles rows={list.rows} />
              </Panel>
            </Stack>
          )
        }
      </Loaded>
    </PageFrame>
  );
}
