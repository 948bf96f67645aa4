import * as people from './0001-people.ts';
import * as catalogue from './0002-catalogue.ts';
import * as orders from './0003-orders.ts';
import * as stockLedger from './0004-stock-ledger.ts';
import * as paymentsAndMail from './0005-payments-and-mail.ts';
import * as catalogueRevision from './0006-catalogue-revision.ts';
import * as stockNotices from './0007-stock-notices.ts';
import * as careLevels from './0008-care-levels.ts';
import * as tunings from './0009-tunings.ts';

/** Every migration in order; the stored name never changes once it has run anywhere. */
export const migrations = [
  { name: '0001-people', ...people },
  { name: '0002-catalogue', ...catalogue },
  { name: '0003-orders', ...orders },
  { name: '0004-stock-ledger', ...stockLedger },
  { name: '0005-payments-and-mail', ...paymentsAndMail },
  { name: '0006-catalogue-revision', ...catalogueRevision },
  { name: '0007-stock-notices', ...stockNotices },
  { name: '0008-care-levels', ...careLevels },
  { name: '0009-tunings', ...tunings },
];
