import type { TelescopeList } from '@faintward/contracts/facilities';
import type { z } from 'zod';

/** The telescopes that can be shared out, with the clock of their site. */
export function telescopesOf(list: z.infer<typeof TelescopeList>) {
  return list.rows.map(({ telescopeId, name, site }) => ({ telescopeId, name, siteTimeZone: site.timeZone }));
}
