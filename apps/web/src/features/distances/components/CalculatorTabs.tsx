import Tab from '@mui/material/Tab';
import Tabs from '@mui/material/Tabs';
import { Link as RouterLink } from 'react-router-dom';
import { paths } from '../../../app/paths';

/** The two parts of the calculator: distances for many redshifts, and one source with its light. */
export function CalculatorTabs({ part }: { part: 'distances' | 'source' }) {
  return (
    <Tabs component="nav" value={part} aria-label="Parts of the calculator" sx={{ mb: 2.5 }}>
      <Tab
        component={RouterLink}
        to={paths.distances.to()}
        value="distances"
        label="Redshifts"
        aria-current={part === 'distances' ? 'page' : undefined}
      />
      <Tab
        component={RouterLink}
        to={paths.source.to()}
        value="source"
        label="A source"
        aria-current={part === 'source' ? 'page' : undefined}
      />
    </Tabs>
  );
}
