import { Navigate } from 'react-router-dom';
import { paths } from '../app/paths';

export function Component() {
  return <Navigate to={paths.administrationPeople.to()} replace />;
}
