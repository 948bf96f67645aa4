import type { State } from './state.ts';

/** Replaces ids by the objects they name, along paths such as `payment_intent.latest_charge`. */
export function expanded(state: State, root: object, paths: string[] = []): object {
  const copy = structuredClone(root) as Record<string, unknown>;
  for (const path of paths) expandAlong(state, copy, path.split('.'));
  return copy;
}

function expandAlong(state: State, holder: Record<string, unknown>, path: string[]): void {
  const [name, ...rest] = path;
  if (name === undefined) return;
  const value = holder[name];
  if (typeof value === 'string') holder[name] = objectOf(state, value) ?? value;
  const next = holder[name];
  for (const item of Array.isArray(next) ? next : [next]) {
    if (typeof item === 'object' && item !== null) {
      expandAlong(state, item as Record<string, unknown>, rest);
    }
  }
}

function objectOf(state: State, id: string): object | undefined {
  const found =
    state.intents[id] ?? state.charges[id] ?? state.refunds[id] ?? state.sessions[id]?.session;
  return structuredClone(found);
}
