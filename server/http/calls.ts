import { z } from 'zod';
import { meSchema, signInSchema, signUpSchema } from '../contracts/auth.ts';
import { addToBasketSchema, basketSchema, changeLineSchema } from '../contracts/basket.ts';
import {
  benchOrderSchema,
  pickRequestSchema,
  queuePageSchema,
  readingRequestSchema,
  readingResponseSchema,
  shipRequestSchema,
} from '../contracts/bench.ts';
import { solveRequestSchema } from '../contracts/brief.ts';
import { analyseRequestSchema, analyseResponseSchema } from '../contracts/circuits.ts';
import { pageQuerySchema } from '../contracts/common.ts';
import {
  auditPageSchema,
  auditQuerySchema,
  changePriceSchema,
  changeStockSchema,
  coverageSchema,
  deskOrderSchema,
  deskOrdersPageSchema,
  deskOrdersQuerySchema,
  deskPartSchema,
  deskPartsPageSchema,
  deskPartsQuerySchema,
  deskTodaySchema,
  partHistorySchema,
  refundRequestSchema,
} from '../contracts/desk.ts';
import {
  buildSheetSchema,
  checkoutResponseSchema,
  checkoutSchema,
  orderSchema,
  ordersPageSchema,
  quoteQuerySchema,
  quoteSchema,
} from '../contracts/orders.ts';
import { packPageSchema, solveResponseSchema } from '../contracts/packs.ts';
import { partsPageSchema, partsQuerySchema } from '../contracts/parts.ts';
import { shopSchema } from '../contracts/shop.ts';

export interface Call {
  method: 'get' | 'post' | 'patch' | 'delete';
  path: string;
  summary: string;
  /** Who may call it; null for everybody. */
  role: 'signed-in' | 'bench' | 'owner' | null;
  query?: z.ZodType;
  body?: z.ZodType;
  answer?: z.ZodType;
  status?: number;
}

const status = z.object({ status: z.string() });

/** Every call of the interface; the served document and the tests are made from this list. */
export const calls: readonly Call[] = [
  { method: 'get', path: '/api/health', summary: 'The process lives', role: null, answer: status },
  {
    method: 'get',
    path: '/api/ready',
    summary: 'The database answers and is migrated',
    role: null,
    answer: status,
  },
  {
    method: 'get',
    path: '/api/shop',
    summary: 'What the forms need to know',
    role: null,
    answer: shopSchema,
  },
  {
    method: 'get',
    path: '/api/parts',
    summary: 'Public catalogue',
    role: null,
    query: partsQuerySchema,
    answer: partsPageSchema,
  },
  {
    method: 'post',
    path: '/api/circuits/analyse',
    summary: 'Solve a circuit given part by part',
    role: null,
    body: analyseRequestSchema,
    answer: analyseResponseSchema,
  },
  {
    method: 'post',
    path: '/api/packs/solve',
    summary: 'Packs from stock for a brief',
    role: null,
    body: solveRequestSchema,
    answer: solveResponseSchema,
  },
  {
    method: 'get',
    path: '/api/packs/{token}',
    summary: 'One pack in full',
    role: null,
    answer: packPageSchema,
  },
  {
    method: 'post',
    path: '/api/auth/sign-up',
    summary: 'Make an account',
    role: null,
    body: signUpSchema,
    answer: meSchema,
    status: 201,
  },
  {
    method: 'post',
    path: '/api/auth/sign-in',
    summary: 'Sign in',
    role: null,
    body: signInSchema,
    answer: meSchema,
  },
  {
    method: 'post',
    path: '/api/auth/sign-out',
    summary: 'Sign out; the session ends at once',
    role: null,
    status: 204,
  },
  {
    method: 'get',
    path: '/api/auth/me',
    summary: 'Who is signed in',
    role: 'signed-in',
    answer: meSchema,
  },
  { method: 'get', path: '/api/basket', summary: 'The basket', role: null, answer: basketSchema },
  {
    method: 'post',
    path: '/api/basket/lines',
    summary: 'Put kits in',
    role: null,
    body: addToBasketSchema,
    answer: basketSchema,
    status: 201,
  },
  {
    method: 'patch',
    path: '/api/basket/lines/{id}',
    summary: 'Change a quantity',
    role: null,
    body: changeLineSchema,
    answer: basketSchema,
  },
  {
    method: 'delete',
    path: '/api/basket/lines/{id}',
    summary: 'Take a line out',
    role: null,
    answer: basketSchema,
  },
  {
    method: 'get',
    path: '/api/checkout/quote',
    summary: 'What the basket costs, shipped',
    role: null,
    query: quoteQuerySchema,
    answer: quoteSchema,
  },
  {
    method: 'post',
    path: '/api/checkout',
    summary: 'Order and go to payment (accepts Idempotency-Key)',
    role: null,
    body: checkoutSchema,
    answer: checkoutResponseSchema,
    status: 201,
  },
  {
    method: 'get',
    path: '/api/orders',
    summary: 'My orders',
    role: 'signed-in',
    query: pageQuerySchema,
    answer: ordersPageSchema,
  },
  {
    method: 'get',
    path: '/api/orders/{ref}',
    summary: 'One order; guests add ?token=',
    role: null,
    answer: orderSchema,
  },
  {
    method: 'get',
    path: '/api/orders/{ref}/lines/{id}/build-sheet',
    summary: 'Build sheet; also as .pdf',
    role: null,
    answer: buildSheetSchema,
  },
  {
    method: 'get',
    path: '/api/bench/queue',
    summary: 'Orders for the bench, by ship-by date',
    role: 'bench',
    query: pageQuerySchema,
    answer: queuePageSchema,
  },
  {
    method: 'get',
    path: '/api/bench/orders/{ref}',
    summary: 'One order as the bench sees it',
    role: 'bench',
    answer: benchOrderSchema,
  },
  {
    method: 'post',
    path: '/api/bench/orders/{ref}/claim',
    summary: 'Claim an order',
    role: 'bench',
    answer: benchOrderSchema,
  },
  {
    method: 'post',
    path: '/api/bench/orders/{ref}/release',
    summary: 'Hand an order back',
    role: 'bench',
    answer: benchOrderSchema,
  },
  {
    method: 'post',
    path: '/api/bench/orders/{ref}/picks',
    summary: 'Say what is in the tray',
    role: 'bench',
    body: pickRequestSchema,
    answer: benchOrderSchema,
  },
  {
    method: 'post',
    path: '/api/bench/orders/{ref}/readings',
    summary: 'Tune a kit to its measured capacitor (accepts Idempotency-Key)',
    role: 'bench',
    body: readingRequestSchema,
    answer: readingResponseSchema,
  },
  {
    method: 'post',
    path: '/api/bench/orders/{ref}/pack',
    summary: 'Close the bag',
    role: 'bench',
    answer: benchOrderSchema,
  },
  {
    method: 'post',
    path: '/api/bench/orders/{ref}/ship',
    summary: 'Send it (accepts Idempotency-Key)',
    role: 'bench',
    body: shipRequestSchema,
    answer: benchOrderSchema,
  },
  {
    method: 'get',
    path: '/api/desk/today',
    summary: 'What needs the owner today',
    role: 'owner',
    answer: deskTodaySchema,
  },
  {
    method: 'get',
    path: '/api/desk/coverage',
    summary: 'Which rates the shelves hold',
    role: 'owner',
    answer: coverageSchema,
  },
  {
    method: 'get',
    path: '/api/desk/parts',
    summary: 'Parts with stock',
    role: 'owner',
    query: deskPartsQuerySchema,
    answer: deskPartsPageSchema,
  },
  {
    method: 'get',
    path: '/api/desk/parts/{id}',
    summary: 'One part',
    role: 'owner',
    answer: deskPartSchema,
  },
  {
    method: 'get',
    path: '/api/desk/parts/{id}/history',
    summary: 'Ledger and audit of a part',
    role: 'owner',
    answer: partHistorySchema,
  },
  {
    method: 'patch',
    path: '/api/desk/parts/{id}/price',
    summary: 'Set a price',
    role: 'owner',
    body: changePriceSchema,
    answer: deskPartSchema,
  },
  {
    method: 'post',
    path: '/api/desk/parts/{id}/stock',
    summary: 'Correct stock (accepts Idempotency-Key)',
    role: 'owner',
    body: changeStockSchema,
    answer: deskPartSchema,
  },
  {
    method: 'get',
    path: '/api/desk/orders',
    summary: 'Orders',
    role: 'owner',
    query: deskOrdersQuerySchema,
    answer: deskOrdersPageSchema,
  },
  {
    method: 'get',
    path: '/api/desk/orders/{ref}',
    summary: 'One order with its payments',
    role: 'owner',
    answer: deskOrderSchema,
  },
  {
    method: 'post',
    path: '/api/desk/orders/{ref}/refund',
    summary: 'Refund in full (accepts Idempotency-Key)',
    role: 'owner',
    body: refundRequestSchema,
    answer: deskOrderSchema,
  },
  {
    method: 'get',
    path: '/api/desk/audit',
    summary: 'Audit log',
    role: 'owner',
    query: auditQuerySchema,
    answer: auditPageSchema,
  },
  {
    method: 'post',
    path: '/api/webhooks/stripe',
    summary: 'Signed events of the payment service',
    role: null,
  },
];
