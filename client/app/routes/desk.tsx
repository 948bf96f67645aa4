import { DeskRoutes } from '../../features/desk/desk-routes.tsx';
import { mayUseDesk } from '../../lib/permissions.ts';
import { StaffOnly } from '../layout/staff-only.tsx';

export function Component() {
  return (
    <StaffOnly place="desk" may={mayUseDesk}>
      <DeskRoutes />
    </StaffOnly>
  );
}
