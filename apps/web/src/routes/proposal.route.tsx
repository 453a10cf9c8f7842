import { Outlet } from 'react-router-dom';

/** The frame of one proposal: its title, state and chain, with the section inside. */
export function Component() {
  return <Outlet />;
}
