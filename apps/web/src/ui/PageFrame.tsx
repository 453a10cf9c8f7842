import Box from '@mui/material/Box';
import Breadcrumbs from '@mui/material/Breadcrumbs';
import Link from '@mui/material/Link';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import type { ReactNode } from 'react';
import { Link as RouterLink } from 'react-router-dom';
import { useDocumentTitle } from '../lib/useDocumentTitle';

export interface PageFrameProps {
  title: string;
  /** What the title is part of, in one quiet line above it: state, semester, "saved 12 s ago". */
  eyebrow?: ReactNode;
  /** Buttons on the right; below the title on a phone. */
  actions?: ReactNode;
  breadcrumbs?: readonly { label: string; to: string }[];
  /** `reading` for text and forms, `page` for most, `full` for wide tables. */
  width?: 'reading' | 'page' | 'full';
  /** Between the title and the content: the chain, tabs, notices. */
  below?: ReactNode;
  children: ReactNode;
}

const widths = { reading: 760, page: 1360, full: 'none' } as const;

/** The frame of every page: where one is, its one h1, what one can do, the content. */
export function PageFrame({ title, eyebrow, actions, breadcrumbs, width = 'page', below, children }: PageFrameProps) {
  useDocumentTitle(title);
  return (
    <Box sx={{ maxWidth: widths[width], mx: 'auto', px: { xs: 2, md: 5 }, pt: { xs: 2.5, md: 3.5 }, pb: 6 }}>
      {breadcrumbs && breadcrumbs.length > 0 && (
        <Breadcrumbs aria-label="Where this page is" sx={{ fontSize: '0.8125rem', mt: '-3px', mb: '5px' }}>
          {breadcrumbs.map((crumb) => (
            <Link
              key={crumb.to}
              component={RouterLink}
              to={crumb.to}
              color="textSecondary"
              // High enough to be met by a finger where the links wrap.
              sx={{ display: 'inline-block', py: '3px' }}
            >
              {crumb.label}
            </Link>
          ))}
          <span aria-current="page">{title}</span>
        </Breadcrumbs>
      )}
      <Stack
        direction={{ xs: 'column', md: 'row' }}
        sx={{ gap: { xs: 1.5, md: 3 }, alignItems: { md: 'flex-end' }, mb: 2.5 }}
      >
        <Box sx={{ flex: 1, minWidth: 0 }}>
          {eyebrow && (
            <Typography variant="body2" color="textSecondary" component="div">
              {eyebrow}
            </Typography>
          )}
          <Typography variant="h1" sx={{ overflowWrap: 'anywhere', fontSize: { xs: '1.5rem', md: '1.875rem' } }}>
            {title}
          </Typography>
        </Box>
        {actions && (
          <Stack direction="row" sx={{ gap: 1.25, flexWrap: 'wrap' }}>
            {actions}
          </Stack>
        )}
      </Stack>
      {below}
      {children}
    </Box>
  );
}
