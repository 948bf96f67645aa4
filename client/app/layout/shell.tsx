import { Outlet, ScrollRestoration, useLocation, useNavigation } from 'react-router-dom';
import { useEffect, useRef } from 'react';
import { Footer } from './footer.tsx';
import { Header } from './header.tsx';

/** Moves focus to the new page's main part, so that keyboard and screen reader start there. */
function useFocusOnArrival() {
  const main = useRef<HTMLElement>(null);
  const { pathname } = useLocation();
  const last = useRef(pathname);
  useEffect(() => {
    if (last.current !== pathname) main.current?.focus({ preventScroll: true });
    last.current = pathname;
  }, [pathname]);
  return main;
}

export function Shell() {
  const main = useFocusOnArrival();
  const busy = useNavigation().state === 'loading';
  return (
    <div className="flex min-h-dvh flex-col">
      <a
        data-skip
        href="#main"
        className="absolute top-2 left-2 z-50 -translate-y-20 rounded-control bg-spruce px-4 py-3 font-heavy text-on-spruce focus:translate-y-0"
      >
        Go to the page
      </a>
      <Header />
      <main id="main" ref={main} tabIndex={-1} aria-busy={busy} className="flex-1 outline-none">
        <Outlet />
      </main>
      <Footer />
      <ScrollRestoration />
    </div>
  );
}
