/** A failure that the person at the terminal can act on: what went wrong, and what to do. */
export class PlainFailure extends Error {
  name = 'PlainFailure';

  constructor(what, advice, detail = '') {
    super(what);
    this.advice = advice;
    this.detail = detail;
  }
}

/** Runs one step of a launch; an unforeseen error is told as this step's failure. */
export async function step(title, advice, work) {
  try {
    return await work();
  } catch (error) {
    if (error instanceof PlainFailure) throw error;
    throw new PlainFailure(`${title} failed: ${error.message}`, advice, error.stack);
  }
}

export function say(text) {
  process.stdout.write(`${text}\n`);
}

/** Tells a failure in words; the stack only when it is not a foreseen one. */
export function tellFailure(error) {
  const lines = [error.message];
  if (error instanceof PlainFailure) {
    if (error.detail) lines.push(indent(error.detail));
    if (error.advice) lines.push(`What to do: ${error.advice}`);
  } else {
    lines.push(error.stack ?? '');
  }
  process.stderr.write(`\n${lines.join('\n')}\n`);
}

function indent(text) {
  return text
    .trimEnd()
    .split('\n')
    .slice(-25)
    .map((line) => `  ${line.slice(0, 300)}`)
    .join('\n');
}
