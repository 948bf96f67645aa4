import {
  queryOptions,
  useIsMutating,
  useMutation,
  useMutationState,
  useQuery,
  useQueryClient,
} from '@tanstack/react-query';
import type { QueryClient } from '@tanstack/react-query';
import { useRef } from 'react';
import { benchOrderSchema, readingResponseSchema } from '../../../../server/contracts/bench.ts';
import type {
  BenchOrder,
  ReadingRequest,
  ShipRequest,
} from '../../../../server/contracts/bench.ts';
import { newIdempotencyKey, request } from '../../../lib/http.ts';
import type { RequestOptions } from '../../../lib/http.ts';
import { ConnectionError, isProblem } from '../../../lib/problem-error.ts';
import { withPicked } from '../walk.ts';
import { queueKey } from './queue.ts';

const refreshMs = 15_000;
const retryMs = 2000;
const retriesOfAPick = 30;
const retriesOfAParcel = 5;
const retriesOfAReading = 5;

export type Move = 'claim' | 'release' | 'pack';

function addressOf(ref: string, rest: string): string {
  return `/api/bench/orders/${encodeURIComponent(ref)}${rest}`;
}

function call(ref: string, rest: string, options: RequestOptions = {}) {
  return request(benchOrderSchema, addressOf(ref, rest), options);
}

function benchOrderOptions(ref: string) {
  return queryOptions({
    queryKey: ['bench', 'order', ref],
    queryFn: ({ signal }) => call(ref, '', { signal }),
  });
}

const pickKey = (ref: string) => ['bench', 'pick', ref];

/** No answer, or a server that is only just coming up: the same request may be sent again. */
function isWorthRepeating(error: Error): boolean {
  if (error instanceof ConnectionError) return true;
  return isProblem(error) && [502, 503, 504].includes(error.status);
}

/** One order; it asks again by itself, but never while a pick is on its way. */
export function useBenchOrder(ref: string) {
  const picking = useIsMutating({ mutationKey: pickKey(ref) }) > 0;
  return useQuery({
    ...benchOrderOptions(ref),
    staleTime: 0,
    refetchInterval: picking ? false : refreshMs,
  });
}

function keep(client: QueryClient, order: BenchOrder): void {
  client.setQueryData(benchOrderOptions(order.ref).queryKey, order);
  void client.invalidateQueries({ queryKey: queueKey });
}

/**
 * Claim, hand back, pack. A refusal means that something changed: the order is read again. `onRefused`
 * is told even when the refresh has taken away the button that asked.
 */
export function useMove(ref: string, onRefused?: (error: Error) => void) {
  const client = useQueryClient();
  return useMutation({
    scope: { id: `bench-${ref}` },
    mutationFn: (move: Move) => call(ref, `/${move}`, { method: 'POST' }),
    onSuccess: (order) => keep(client, order),
    onError: (error) => {
      onRefused?.(error);
      void client.invalidateQueries({ queryKey: benchOrderOptions(ref).queryKey });
      void client.invalidateQueries({ queryKey: queueKey });
    },
  });
}

/**
 * Says how many pieces of a pick are in the tray. The walk goes on at once; the word to the server
 * follows in order and is repeated while the connection is down, since saying it twice is harmless.
 */
export function usePick(ref: string) {
  const client = useQueryClient();
  const { queryKey } = benchOrderOptions(ref);
  return useMutation({
    mutationKey: pickKey(ref),
    scope: { id: `bench-${ref}` },
    networkMode: 'always',
    retry: (failures, error) => failures < retriesOfAPick && isWorthRepeating(error),
    retryDelay: retryMs,
    mutationFn: (body: { id: string; quantity: number }) =>
      call(ref, '/picks', { method: 'POST', body }),
    onMutate: async ({ id, quantity }) => {
      await client.cancelQueries({ queryKey });
      client.setQueryData(queryKey, (order) => order && withPicked(order, id, quantity));
    },
    onSuccess: (order) => {
      // An answer from before a later pick would take that pick back on the screen.
      if (client.isMutating({ mutationKey: pickKey(ref) }) <= 1) keep(client, order);
    },
    onError: () => client.invalidateQueries({ queryKey }),
  });
}

/** How many picks wait for the connection to come back. */
export function useHeldPicks(ref: string): number {
  const failures = useMutationState({
    filters: { mutationKey: pickKey(ref), status: 'pending' },
    select: (mutation) => mutation.state.failureCount,
  });
  return failures.some((count) => count > 0) ? failures.length : 0;
}

/** Sends a capacitor's reading; the answer says which R4 to take, and holds the order as it is then. */
export function useReading(ref: string) {
  const client = useQueryClient();
  return useMutation({
    scope: { id: `bench-${ref}` },
    networkMode: 'always',
    retry: (failures, error) => failures < retriesOfAReading && isWorthRepeating(error),
    retryDelay: retryMs,
    mutationFn: ({ key, ...body }: ReadingRequest & { key: string }) =>
      request(readingResponseSchema, addressOf(ref, '/readings'), {
        method: 'POST',
        body,
        idempotencyKey: key,
      }),
    onSuccess: ({ order }) => keep(client, order),
  });
}

/** Sends the parcel on its way, under one key for one parcel as it is written down. */
export function useShip(ref: string) {
  const client = useQueryClient();
  const last = useRef<{ text: string; key: string }>(undefined);
  return useMutation({
    scope: { id: `bench-${ref}` },
    networkMode: 'always',
    retry: (failures, error) => failures < retriesOfAParcel && isWorthRepeating(error),
    retryDelay: retryMs,
    mutationFn: (body: ShipRequest) => {
      const text = JSON.stringify(body);
      if (last.current?.text !== text) last.current = { text, key: newIdempotencyKey() };
      return call(ref, '/ship', { method: 'POST', body, idempotencyKey: last.current.key });
    },
    onSuccess: (order) => keep(client, order),
  });
}
