import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { basketSchema } from '../../../../server/contracts/basket.ts';
import { request } from '../../../lib/http.ts';

export const basketOptions = queryOptions({
  queryKey: ['basket'],
  queryFn: ({ signal }) => request(basketSchema, '/api/basket', { signal }),
});

export function useBasket() {
  return useQuery(basketOptions);
}

function useBasketChange<Input>(send: (input: Input) => ReturnType<typeof readBasket>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: send,
    onSuccess: (basket) => {
      client.setQueryData(basketOptions.queryKey, basket);
      return client.invalidateQueries({ queryKey: ['checkout'] });
    },
  });
}

function readBasket(path: string, method: 'POST' | 'PATCH' | 'DELETE', body?: unknown) {
  return request(basketSchema, path, { method, body });
}

export function usePutInBasket() {
  return useBasketChange((input: { token: string; quantity: number }) =>
    readBasket('/api/basket/lines', 'POST', input),
  );
}

export function useChangeLine() {
  return useBasketChange((input: { id: string; quantity: number }) =>
    readBasket(`/api/basket/lines/${encodeURIComponent(input.id)}`, 'PATCH', {
      quantity: input.quantity,
    }),
  );
}

export function useRemoveLine() {
  return useBasketChange((id: string) =>
    readBasket(`/api/basket/lines/${encodeURIComponent(id)}`, 'DELETE'),
  );
}
