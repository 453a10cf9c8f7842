import { QueryClient } from '@tanstack/react-query';
import { render } from '@testing-library/react';
import type { ReactNode } from 'react';
import { createMemoryRouter, RouterProvider, type RouteObject } from 'react-router-dom';
import { Providers } from '../app/App';
import { routes } from '../app/routes';

function testClient(): QueryClient {
  return new QueryClient({
    defaultOptions: { queries: { retry: false, networkMode: 'always' }, mutations: { networkMode: 'always' } },
  });
}

/** The whole application at an address. Pages load lazily: give the first `findBy…` some seconds. */
export function renderRoute(address: string, table: RouteObject[] = routes) {
  const router = createMemoryRouter(table, { initialEntries: [address] });
  const queryClient = testClient();
  return {
    router,
    queryClient,
    ...render(
      <Providers queryClient={queryClient}>
        <RouterProvider router={router} />
      </Providers>,
    ),
  };
}

/** One part, with the theme, a router and a query client around it. */
export function renderPart(part: ReactNode, address = '/') {
  return renderRoute(address, [{ path: '*', element: part }]);
}
