import Button from '@mui/material/Button';
import { isRouteErrorResponse, useRouteError } from 'react-router-dom';
import { NotFoundPage } from '../ui/PageStates';
import { Note } from '../ui/Note';
import { PageFrame } from '../ui/PageFrame';

/** Drawn in place of a page that threw. A new release removes old files, so a page that cannot load asks for a reload. */
export function RouteError() {
  const error = useRouteError();
  if (isRouteErrorResponse(error) && error.status === 404) return <NotFoundPage />;
  const isStale = error instanceof TypeError && /dynamically imported module|importing a module/i.test(error.message);
  return (
    <PageFrame title={isStale ? 'This page could not be loaded' : 'This page met a fault of its own'} width="reading">
      <Note tone="error" live action={<Button onClick={() => window.location.reload()}>Reload</Button>}>
        {isStale
          ? 'Either the connection is gone or a new version has been installed. Reloading helps with the second.'
          : 'What you had saved is safe. If it happens again after reloading, please tell the observatory what you did.'}
      </Note>
    </PageFrame>
  );
}
