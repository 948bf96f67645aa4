import { Route, Routes } from 'react-router-dom';
import { benchPaths } from './bench-paths.ts';
import { NoSuchPage } from './components/no-such-page.tsx';
import { OrderPage } from './components/order-page.tsx';
import { QueuePage } from './components/queue-page.tsx';

/** The packers' side: the queue, and one order at a time. */
export function BenchRoutes() {
  return (
    <Routes>
      <Route path={benchPaths.queue.pattern} element={<QueuePage />} />
      <Route path={benchPaths.order.pattern} element={<OrderPage />} />
      <Route path="*" element={<NoSuchPage />} />
    </Routes>
  );
}
