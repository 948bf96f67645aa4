import pg from 'pg';

/** What was heard since last asked: ids of parts, or that any part may have changed. */
export type Heard = readonly number[] | 'all';

export interface ShelfListener {
  /** The connection that listens; queries may run over it. */
  client: pg.Client;
  /**
   * Once this resolves, every change whose commit was answered before the call has been heard:
   * PostgreSQL sends what it has for a listener before it reports the end of a query.
   */
  fence(): Promise<void>;
  /** Hands out what was heard and forgets it; null for nothing. A new listener has heard 'all'. */
  take(): Heard | null;
  close(): void;
}

const connectMs = 3000;
const readMs = 30_000;
/** Asks for nothing. A time limit of one query is missing from the driver's types alone. */
const askNothing = { text: 'select', query_timeout: 5000 };

/** Opens a connection that hears of every change to parts and lots; throws when it cannot. */
export async function listenToShelves(databaseUrl: string): Promise<ShelfListener> {
  const client = new pg.Client({
    connectionString: databaseUrl,
    application_name: 'tockwell-shelves',
    keepAlive: true,
    connectionTimeoutMillis: connectMs,
    query_timeout: readMs,
  });
  let heard = new Set<number>();
  let all = true;
  client.on('notification', ({ payload }) => {
    if (payload === undefined || payload === 'all') all = true;
    else for (const id of payload.split(',')) heard.add(Number(id));
  });
  // A lost connection shows at the next fence; without a listener the event would end the process.
  client.on('error', () => undefined);
  const close = () => void client.end().catch(() => undefined);
  try {
    await client.connect();
    await client.query('listen shelves');
  } catch (error) {
    close();
    throw error;
  }
  return {
    client,
    async fence() {
      await client.query(askNothing);
    },
    take() {
      const taken = all ? 'all' : heard.size > 0 ? [...heard] : null;
      heard = new Set();
      all = false;
      return taken;
    },
    close,
  };
}
