import type { SizeRelation } from '@faintward/contracts/light';
import type { LightSuggestion } from '@faintward/contracts/light-report';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Typography from '@mui/material/Typography';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { formatNumber } from '../../lib/format';
import { Note } from '../Note';
import { Loaded } from '../PageStates';
import { Disclosure } from './Disclosure';
import { extentPart, lightPart, numberText, type LightDraft } from './lightDraft';
import { lightQueries } from './lightQueries';
import { provenanceWords } from './lightWords';

/** What a suggestion would set of a draft. Empty: it is only for reading. */
function suggestedChange(row: LightSuggestion): Partial<LightDraft> {
  return {
    ...(row.light ? lightPart(row.light) : {}),
    ...(row.extent ? extentPart(row.extent) : {}),
    ...(row.velocityWidthKmS === null ? {} : { width: numberText(row.velocityWidthKmS) }),
  };
}

/** Typical values from the literature, offered; taking one up is a press of a button, and can be put back. */
export function Suggestions({
  redshift,
  relation,
  draft,
  disabled = false,
  onChange,
}: {
  redshift: number | undefined;
  relation: SizeRelation;
  draft: LightDraft;
  disabled?: boolean | undefined;
  onChange: (change: Partial<LightDraft>) => void;
}) {
  const [isWanted, setIsWanted] = useState(false);
  const [filled, setFilled] = useState<{ title: string; before: LightDraft }>();
  const query = useQuery({
    ...lightQueries.suggestions(redshift ?? 0, relation),
    enabled: isWanted && redshift !== undefined,
  });
  return (
    <>
      {filled && (
        <Note
          live
          action={
            <Button
              size="small"
              onClick={() => {
                onChange(filled.before);
                setFilled(undefined);
              }}
            >
              Put back what stood there
            </Button>
          }
        >
          Filled in from a suggestion, not a measurement: {filled.title}.
        </Note>
      )}
      <Disclosure title="Typical values" summary="suggestions from the literature" onOpen={() => setIsWanted(true)}>
        {redshift === undefined ? (
          <Typography color="textSecondary">They depend on the redshift: give that first.</Typography>
        ) : (
          <Loaded query={query} what="The suggestions">
            {({ rows }) => (
              <Box
                component="ul"
                aria-label={`Typical at redshift ${formatNumber(redshift)}`}
                sx={{ listStyle: 'none', m: 0, p: 0 }}
              >
                {rows.map((row) => (
                  <Row
                    key={row.id}
                    row={row}
                    draft={draft}
                    disabled={disabled}
                    onUse={() => {
                      setFilled({ title: row.title, before: draft });
                      onChange(suggestedChange(row));
                    }}
                  />
                ))}
                {rows.length === 0 && <li>There is none at this redshift.</li>}
              </Box>
            )}
          </Loaded>
        )}
      </Disclosure>
    </>
  );
}

/** Where it is from, and how far that may be trusted. */
function attribution({ source, provenance }: LightSuggestion): string {
  const words = provenanceWords[provenance];
  return source === words ? source : `${source} (${words})`;
}

/** Whether a width says anything of what is described: only lines have one. */
function hasWidth({ light, tracer }: LightDraft): boolean {
  return (
    light === 'lineFlux' || light === 'lineLuminosity' || (light === 'starFormationRate' && tracer !== 'ultraviolet')
  );
}

function Row({
  row,
  draft,
  disabled,
  onUse,
}: {
  row: LightSuggestion;
  draft: LightDraft;
  disabled: boolean;
  onUse: () => void;
}) {
  const canFill = row.light !== null || row.extent !== null || (row.velocityWidthKmS !== null && hasWidth(draft));
  return (
    <Box
      component="li"
      sx={{
        display: 'flex',
        gap: 1.5,
        alignItems: 'flex-start',
        py: 1,
        borderTop: 1,
        borderColor: 'divider',
        '&:first-of-type': { borderTop: 0, pt: 0 },
      }}
    >
      <Box sx={{ flex: 1, minWidth: 0, overflowWrap: 'anywhere' }}>
        <Typography variant="body2" sx={{ fontWeight: 600 }}>
          {row.title}
        </Typography>
        <Typography variant="body2">
          {row.valueText}
          {row.spreadText && `, ${row.spreadText}`}
        </Typography>
        <Typography variant="body2" color="textSecondary">
          {attribution(row)}.{' '}
          {row.isExtrapolated ? (
            <Box component="span" sx={{ color: 'warning.main', fontWeight: 600 }}>
              ▲ outside its range: {row.validText}
            </Box>
          ) : (
            row.validText
          )}
        </Typography>
      </Box>
      {canFill && (
        <Button size="small" disabled={disabled} onClick={onUse} aria-label={`Use ${row.title}`}>
          Use
        </Button>
      )}
    </Box>
  );
}

/** Under a choice that is a suggestion: that it is one, its value at this redshift, and where it is from. */
export function SuggestionLine({
  redshift,
  relation,
  find,
}: {
  redshift: number | undefined;
  relation?: SizeRelation;
  find: (row: LightSuggestion) => boolean;
}) {
  const query = useQuery({
    ...lightQueries.suggestions(redshift ?? 0, relation),
    enabled: redshift !== undefined,
  });
  const row = query.data?.rows.find(find);
  return (
    <Box sx={{ gridColumn: '1 / -1' }}>
      <Note>
        A suggestion, not a measurement{row ? `: ${row.valueText}` : ''}.{row && ` ${row.source}.`}
        {row?.isExtrapolated && ` Outside its range: ${row.validText}`}
        {!row && ' It follows the redshift; its source is named with the result.'}
      </Note>
    </Box>
  );
}
