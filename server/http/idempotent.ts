import type { Request, RequestHandler, Response } from 'express';
import type { Deps } from '../ports.ts';
import { answerOnce, type Answer } from '../use-cases/answer-once.ts';
import { guestKeyHash, signedIn } from './visitor.ts';

type Handler = (req: Request, res: Response) => Promise<Answer>;

/**
 * Answers a call that creates money or stock movements: once for each Idempotency-Key of a buyer,
 * each time when there is none.
 */
export function idempotent(deps: Pick<Deps, 'db'>, handler: Handler): RequestHandler {
  return async (req, res) => {
    const key = req.get('idempotency-key');
    const who = signedIn(req)?.id ?? guestKeyHash(req) ?? 'guest';
    const scope = `${req.method} ${req.baseUrl}${req.path} ${who}`;
    const answer =
      key === undefined
        ? await handler(req, res)
        : await answerOnce(deps, { scope, key, body: req.body }, () => handler(req, res));
    res.status(answer.status).json(answer.body);
  };
}
