import { Logger, run, type Runner, type TaskList } from 'graphile-worker';
import type { Pool } from 'pg';
import type { Logger as Log } from 'pino';
import type { Deps, MailSender } from '../ports.ts';
import { applyPaymentEvent } from '../use-cases/apply-payment-event.ts';
import { releaseExpiredReservations } from '../use-cases/release-expired-reservations.ts';
import { sendMail } from '../use-cases/send-mail.ts';

export type JobDeps = Deps & { mail: MailSender };

function field(payload: unknown, name: string): unknown {
  return typeof payload === 'object' && payload !== null
    ? (payload as Record<string, unknown>)[name]
    : undefined;
}

/** What the queue can do, by name. Each is safe to repeat: the queue retries what throws. */
export function tasks(deps: JobDeps): TaskList {
  return {
    'send-mail': async (payload) => {
      const id = field(payload, 'outboxId');
      if (typeof id === 'number') await sendMail(deps, id);
    },
    'apply-payment-event': async (payload) => {
      const id = field(payload, 'eventId');
      if (typeof id === 'string') await applyPaymentEvent(deps, id);
    },
    'release-expired-reservations': async () => {
      await releaseExpiredReservations(deps);
    },
  };
}

/** Reservations are swept every minute. */
const timetable = '* * * * * release-expired-reservations ?max=2';

/** Starts working off the queue in this process; several processes share one queue. */
export function startWorker(deps: JobDeps, pool: Pool, log: Log): Promise<Runner> {
  return run({
    pgPool: pool,
    taskList: tasks(deps),
    crontab: timetable,
    concurrency: 3,
    pollInterval: 1000,
    noHandleSignals: true,
    logger: new Logger(() => (level, message) => {
      const name: string = level;
      if (name === 'error') log.error(message);
      else if (name === 'warning') log.warn(message);
    }),
  });
}
