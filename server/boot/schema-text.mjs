/** A dump without what differs from one run or PostgreSQL release to the next. */
export function cleanDump(dump) {
  const kept = dump
    .split('\n')
    .filter((line) => !/^(--|\\restrict|\\unrestrict|SET |SELECT pg_catalog\.)/.test(line));
  return `${kept
    .join('\n')
    .replace(/\n{3,}/g, '\n\n')
    .trim()}\n`;
}

/** The first line in which two texts part, as a hint where to look. */
export function firstDifference(kept, fresh) {
  const [before, after] = [kept.split('\n'), fresh.split('\n')];
  const at = after.findIndex((line, index) => line !== before[index]);
  const line = at === -1 ? after.length : at;
  return `line ${line + 1}\n- ${before[line] ?? '(ends)'}\n+ ${after[line] ?? '(ends)'}`;
}
