import type { LightSuggestion } from '@faintward/contracts/light-report';
import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import { provenanceWords } from '../light/lightWords';

/** Typical values from the literature: none of them is in the numbers of the report. */
export function SuggestionNotes({ suggestions }: { suggestions: readonly LightSuggestion[] }) {
  return (
    <Box component="ul" sx={{ listStyle: 'none', m: 0, p: 0, display: 'grid', gap: 1.5 }}>
      {suggestions.map((suggestion) => (
        <Box
          component="li"
          key={suggestion.id}
          sx={{ borderLeft: '2px dashed', borderColor: 'faintward.edge', pl: 1.5 }}
        >
          <Typography component="div">
            {suggestion.title}: <strong>{suggestion.valueText}</strong>
            {suggestion.spreadText && <>, {suggestion.spreadText}</>}
          </Typography>
          <Typography variant="body2" color="textSecondary" component="div">
            {suggestion.isExtrapolated && <strong>Beyond the range it was measured in. </strong>}
            {suggestion.validText.replace(/\.$/, '')}. {suggestion.source} ({provenanceWords[suggestion.provenance]}).
          </Typography>
        </Box>
      ))}
    </Box>
  );
}
