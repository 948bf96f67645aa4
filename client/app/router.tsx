import { createBrowserRouter } from 'react-router-dom';
import type { RouteObject } from 'react-router-dom';
import { ErrorPage } from './layout/error-page.tsx';
import { FirstPaint } from './layout/first-paint.tsx';
import { Shell } from './layout/shell.tsx';
import { paths } from './paths.ts';

type PageModule = { Component: React.ComponentType };

function page(pattern: string, load: () => Promise<PageModule>): RouteObject {
  return { path: pattern, lazy: load };
}

/** Each page is a module of its own, fetched when somebody goes there. */
const pages: RouteObject[] = [
  page(paths.home.pattern, () => import('./routes/home.tsx')),
  page(paths.pack.pattern, () => import('./routes/pack.tsx')),
  page(paths.basket.pattern, () => import('./routes/basket.tsx')),
  page(paths.checkout.pattern, () => import('./routes/checkout.tsx')),
  page(paths.orders.pattern, () => import('./routes/orders.tsx')),
  page(paths.order.pattern, () => import('./routes/order.tsx')),
  page(paths.thanks.pattern, () => import('./routes/thanks.tsx')),
  page(paths.buildSheet.pattern, () => import('./routes/build-sheet.tsx')),
  page(paths.signIn.pattern, () => import('./routes/sign-in.tsx')),
  page(paths.signUp.pattern, () => import('./routes/sign-up.tsx')),
  page(paths.account.pattern, () => import('./routes/account.tsx')),
  page(paths.help.pattern, () => import('./routes/help.tsx')),
  page(paths.terms.pattern, () => import('./routes/terms.tsx')),
  page(paths.privacy.pattern, () => import('./routes/privacy.tsx')),
  page(paths.bench.pattern, () => import('./routes/bench.tsx')),
  page(paths.desk.pattern, () => import('./routes/desk.tsx')),
  page('*', () => import('./routes/not-found.tsx')),
];

export function createRouter() {
  return createBrowserRouter([
    {
      element: <Shell />,
      errorElement: <ErrorPage />,
      HydrateFallback: FirstPaint,
      children: [{ errorElement: <ErrorPage />, children: pages }],
    },
  ]);
}
