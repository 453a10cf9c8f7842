import type { SVGProps } from 'react';
import { colour } from '../../theme/theme';

/** Words within a picture, which stay readable where lines or areas lie under them. */
export function PlotText(props: SVGProps<SVGTextElement>) {
  return (
    <text fontSize="12" fill={colour.ink} stroke={colour.surface} strokeWidth="3" paintOrder="stroke" {...props} />
  );
}
