import { seedDemoShop } from '../seeds/demo-shop.ts';
import { seedReference } from '../seeds/reference.ts';
import { openDatabase } from './store/connection.ts';
import { migrateToLatest } from './store/migrate.ts';

const databaseUrl = process.env.DATABASE_URL;
if (!databaseUrl) throw new Error('DATABASE_URL must name a PostgreSQL database.');
const demo = process.env.NODE_ENV !== 'production' || process.env.DEMO === '1';

await migrateToLatest(databaseUrl);
const db = openDatabase(databaseUrl, 2);
try {
  await seedReference(db);
  if (demo) await seedDemoShop(db);
} finally {
  await db.destroy();
}
