import { BenchRoutes } from '../../features/bench/bench-routes.tsx';
import { mayUseBench } from '../../lib/permissions.ts';
import { useNightByDefault } from '../../lib/use-theme.ts';
import { StaffOnly } from '../layout/staff-only.tsx';

export function Component() {
  useNightByDefault();
  return (
    <StaffOnly place="bench" may={mayUseBench}>
      <BenchRoutes />
    </StaffOnly>
  );
}
