import { clsx } from 'clsx';
import { Link, NavLink } from 'react-router-dom';
import { useBasket } from '../../features/basket/api/basket.ts';
import { mayUseBench, mayUseDesk } from '../../lib/permissions.ts';
import { useSession } from '../../lib/session.ts';
import { noBreak } from '../../lib/spaces.ts';
import { Mark } from '../../ui/mark.tsx';
import { Page } from '../../ui/page.tsx';
import { paths } from '../paths.ts';

interface Entry {
  to: string;
  words: string;
  end?: boolean;
}

function useEntries(): Entry[] {
  const me = useSession();
  const basket = useBasket().data;
  const kits =
    basket === undefined || basket.kits === 0 ? '' : `${noBreak}·${noBreak}${basket.kits}`;
  return [
    { to: paths.home.link(), words: `Make${noBreak}a${noBreak}kit`, end: true },
    { to: paths.orders.link(), words: `My${noBreak}orders` },
    { to: paths.help.link(), words: 'Help' },
    ...(mayUseBench(me) ? [{ to: paths.bench.link(), words: 'Bench' }] : []),
    ...(mayUseDesk(me) ? [{ to: paths.desk.link(), words: 'Desk' }] : []),
    me === null || me === undefined
      ? { to: paths.signIn.link(), words: `Sign${noBreak}in` }
      : { to: paths.account.link(), words: 'Account' },
    { to: paths.basket.link(), words: `Basket${kits}` },
  ];
}

/** Name and ways on; on a phone all of them stay in sight, the basket beside the name. */
export function Header() {
  const entries = useEntries();
  return (
    <header data-shell className="border-b border-line">
      <Page className="relative flex flex-wrap items-center justify-between gap-x-8 sm:min-h-[4.5rem]">
        <Link to={paths.home.link()} className="flex min-h-14 items-center gap-2.5">
          <Mark className="size-9" />
          <span className="text-title font-heavy tracking-tight">Tockwell</span>
        </Link>
        <nav aria-label="Main" className="-mx-1.5 max-sm:w-full">
          <ul className="flex flex-wrap gap-x-0.5 sm:gap-x-3">
            {entries.map((entry) => (
              <li
                key={entry.to}
                className="max-sm:last:absolute max-sm:last:top-1.5 max-sm:last:right-2.5"
              >
                <NavLink
                  to={entry.to}
                  end={entry.end}
                  className={({ isActive }) =>
                    clsx(
                      'inline-flex min-h-11 items-center border-b-[3px] px-1 pt-[3px] sm:px-1.5',
                      isActive
                        ? 'border-spruce font-heavy text-ink'
                        : 'border-transparent text-soft hover:border-line hover:text-ink',
                    )
                  }
                >
                  {entry.words}
                </NavLink>
              </li>
            ))}
          </ul>
        </nav>
      </Page>
    </header>
  );
}
