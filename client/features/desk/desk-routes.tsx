import { Route, Routes } from 'react-router-dom';
import { Page } from '../../ui/page.tsx';
import { AuditPage } from './components/audit-page.tsx';
import { DeskNav } from './components/desk-nav.tsx';
import { NoSuchPage } from './components/no-such-page.tsx';
import { OrderPage } from './components/order-page.tsx';
import { OrdersPage } from './components/orders-page.tsx';
import { PartPage } from './components/part-page.tsx';
import { PartsPage } from './components/parts-page.tsx';
import { TodayPage } from './components/today-page.tsx';
import { deskPaths } from './desk-paths.ts';

/** The owner's side. */
export function DeskRoutes() {
  return (
    <Page className="pb-16">
      <DeskNav />
      <Routes>
        <Route path={deskPaths.today.pattern} element={<TodayPage />} />
        <Route path={deskPaths.parts.pattern} element={<PartsPage />} />
        <Route path={deskPaths.part.pattern} element={<PartPage />} />
        <Route path={deskPaths.orders.pattern} element={<OrdersPage />} />
        <Route path={deskPaths.order.pattern} element={<OrderPage />} />
        <Route path={deskPaths.audit.pattern} element={<AuditPage />} />
        <Route path="*" element={<NoSuchPage />} />
      </Routes>
    </Page>
  );
}
