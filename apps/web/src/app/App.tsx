import CssBaseline from '@mui/material/CssBaseline';
import { ThemeProvider } from '@mui/material/styles';
import { QueryClientProvider, type QueryClient } from '@tanstack/react-query';
import { useState, type ReactNode } from 'react';
import { createBrowserRouter, RouterProvider } from 'react-router-dom';
import { createQueryClient } from '../lib/queryClient';
import { theme } from '../theme/theme';
import { modeStorageKey, schemeStorageKey } from '../theme/useThemeChoice';
import { NoticesProvider } from '../ui/Notices';
import { routes } from './routes';

/** All that pages expect around them; tests use it too. */
export function Providers({ queryClient, children }: { queryClient: QueryClient; children: ReactNode }) {
  return (
    <ThemeProvider
      theme={theme}
      defaultMode="system"
      modeStorageKey={modeStorageKey}
      colorSchemeStorageKey={schemeStorageKey}
      disableTransitionOnChange
      noSsr
    >
      <CssBaseline enableColorScheme />
      <QueryClientProvider client={queryClient}>
        <NoticesProvider>{children}</NoticesProvider>
      </QueryClientProvider>
    </ThemeProvider>
  );
}

export function App() {
  const [queryClient] = useState(createQueryClient);
  const [router] = useState(() => createBrowserRouter(routes));
  return (
    <Providers queryClient={queryClient}>
      <RouterProvider router={router} />
    </Providers>
  );
}
