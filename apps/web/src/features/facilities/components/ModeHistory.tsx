import type { ModeConfigurationVersion } from '@faintward/contracts/facilities';
import Box from '@mui/material/Box';
import { TimeDisplay } from '../../../ui/TimeDisplay';
import { differencesOf } from '../configurationFields';

/** Versions of a mode's configuration, newest first, each with what it changed. */
export function ModeHistory({ versions }: { versions: readonly ModeConfigurationVersion[] }) {
  const sorted = versions.toSorted((a, b) => b.version - a.version);
  return (
    <Box component="ol" sx={{ listStyle: 'none', p: 0, m: 0 }}>
      {sorted.map((version, index) => {
        const before = sorted[index + 1];
        const changes = before ? differencesOf(before.configuration, version.configuration) : [];
        return (
          <Box
            component="li"
            key={version.version}
            sx={{ borderTop: 1, borderColor: 'divider', py: 1, fontSize: '0.875rem' }}
          >
            <strong>Configuration {version.version}</strong>, <TimeDisplay instant={version.createdAt} short />
            {version.createdByName ? `, ${version.createdByName}` : ''}
            {version.note && <Box sx={{ color: 'text.secondary' }}>{version.note}</Box>}
            {changes.map((change) => (
              <Box key={change.label}>
                {change.label}: {change.before} → {change.after}
              </Box>
            ))}
          </Box>
        );
      })}
    </Box>
  );
}
