import { clsx } from 'clsx';
import { NavLink } from 'react-router-dom';
import { deskPaths } from '../desk-paths.ts';

const drawers = [
  { to: deskPaths.today.link(), words: 'Today', end: true },
  { to: deskPaths.parts.link(), words: 'Parts' },
  { to: deskPaths.orders.link(), words: 'Orders' },
  { to: deskPaths.audit.link(), words: 'Audit' },
];

/** The desk's drawers, as tabs cut into the top of the paper. */
export function DeskNav() {
  return (
    <nav aria-label="Desk" className="no-print mt-3 border-b border-line">
      <ul className="-mb-px flex gap-1">
        {drawers.map((drawer) => (
          <li key={drawer.to} className="[filter:drop-shadow(0_0_0.75px_var(--color-soft))]">
            <NavLink
              to={drawer.to}
              end={drawer.end}
              className={({ isActive }) =>
                clsx(
                  'inline-flex min-h-11 items-center px-4 [clip-path:polygon(0_0,calc(100%-0.75rem)_0,100%_0.75rem,100%_100%,0_100%)]',
                  isActive
                    ? 'bg-card font-heavy text-ink'
                    : 'bg-paper-deep text-soft hover:text-ink',
                )
              }
            >
              {drawer.words}
            </NavLink>
          </li>
        ))}
      </ul>
    </nav>
  );
}
