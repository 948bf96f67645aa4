import { Link } from 'react-router-dom';
import { useShop } from '../../lib/shop.ts';
import { Page } from '../../ui/page.tsx';
import { paths } from '../paths.ts';
import { ThemeSwitch } from './theme-switch.tsx';

const linkClass = 'link inline-flex min-h-11 items-center sm:min-h-8';

/** The shop's address, the small print, and the switch between day and night. */
export function Footer() {
  const shop = useShop();
  return (
    <footer data-shell className="mt-24 border-t-4 border-double border-line bg-paper-deep">
      <Page className="grid gap-x-12 gap-y-8 py-10 sm:grid-cols-[1.4fr_1fr_1fr]">
        <div>
          <address className="not-italic">
            <strong className="font-heavy">{shop?.name ?? 'Tockwell'}</strong>
            {shop?.address.map((line) => (
              <span key={line} className="block text-soft">
                {line}
              </span>
            ))}
          </address>
          {shop !== undefined && (
            <a className={linkClass} href={`mailto:${shop.email}`}>
              {shop.email}
            </a>
          )}
        </div>
        <ul>
          <li>
            <Link className={linkClass} to={paths.help.link()}>
              Help
            </Link>
          </li>
          <li>
            <Link className={linkClass} to={paths.terms.link()}>
              Terms
            </Link>
          </li>
          <li>
            <Link className={linkClass} to={paths.privacy.link()}>
              Privacy
            </Link>
          </li>
        </ul>
        <div>
          <ThemeSwitch />
          {typeof shop?.mailPageUrl === 'string' && (
            <p>
              <a className={linkClass} href={shop.mailPageUrl}>
                Caught mail
              </a>
            </p>
          )}
          {shop?.demo === true && (
            <p className="mt-2 text-small text-soft">
              This is a demonstration shop. Its shelves, prices and people are invented; nothing is
              charged and nothing is sent.
            </p>
          )}
        </div>
      </Page>
    </footer>
  );
}
