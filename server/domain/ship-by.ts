/** The shop's working week and cut-off; hours and days in UTC, as Merrow Quay keeps it. */
export const shippingRule = {
  cutOffHour: 14,
  leaveHour: 16,
  workingDays: [1, 2, 3, 4, 5],
} as const;

/**
 * When a paid order must have left: 16:00 of the same day when paid before 14:00 on a working day,
 * of the next working day otherwise. Neglects public holidays.
 */
export function shipBy(paidAt: Date): Date {
  const day = new Date(paidAt);
  const works = (date: Date) =>
    (shippingRule.workingDays as readonly number[]).includes(date.getUTCDay());
  if (!works(day) || day.getUTCHours() >= shippingRule.cutOffHour) {
    do day.setUTCDate(day.getUTCDate() + 1);
    while (!works(day));
  }
  day.setUTCHours(shippingRule.leaveHour, 0, 0, 0);
  return day;
}
