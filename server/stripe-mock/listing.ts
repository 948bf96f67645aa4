import type { Request, Router } from 'express';
import { z } from 'zod';
import { missingResource } from './api-error.ts';
import { expanded } from './expand.ts';
import { listParameters, readParameters } from './parameters.ts';
import type { State } from './state.ts';

interface Kind {
  place: string;
  kind: string;
  /** The parameter an unknown id is blamed on. */
  param?: string;
  all: () => Record<string, object & { id: string }>;
}

/** Retrieve and list of one kind of object, newest first. */
export function readable(router: Router, state: State, { place, kind, param, all }: Kind): void {
  router.get(`/${place}/:id`, (request, response) => {
    const found = all()[request.params.id];
    if (!found) throw missingResource(kind, request.params.id, param);
    response.json(expanded(state, found, expandOf(request)));
  });
  router.get(`/${place}`, (request, response) => {
    const answer = list(request, `/v1/${place}`, Object.values(all()).reverse());
    response.json(expanded(state, answer, expandOf(request)));
  });
}

const filters = ['payment_intent', 'charge', 'type'] as const;

export function list(request: Request, url: string, all: (object & { id: string })[]) {
  const asked = readParameters(listParameters, request.query);
  const matching = all.filter((item) =>
    filters.every((name) => asked[name] === undefined || valueOf(item, name) === asked[name]),
  );
  const from = matching.findIndex(({ id }) => id === asked.starting_after) + 1;
  const data = matching.slice(from, from + asked.limit);
  return { object: 'list', url, has_more: matching.length > from + asked.limit, data };
}

function valueOf(item: object, name: string): unknown {
  return (item as Record<string, unknown>)[name];
}

export function expandOf(request: Request): string[] | undefined {
  const source = (request.method === 'GET' ? request.query : request.body) as object | undefined;
  return readParameters(z.object({ expand: z.array(z.string()).optional() }), source).expand;
}
