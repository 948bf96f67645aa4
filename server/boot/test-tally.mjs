/**
 * Counts tests from Vitest's JSON report. A file that could not even be loaded has no tests and counts
 * as one failure, and so does a run that failed for any other reason.
 */
export function tallyOf(report, exitCode) {
  const passed = report?.numPassedTests ?? 0;
  const unloaded = (report?.testResults ?? []).filter(
    ({ status, assertionResults }) => status === 'failed' && !anyFailed(assertionResults),
  );
  const failed = (report?.numFailedTests ?? 0) + unloaded.length;
  return { passed, failed: failed === 0 && exitCode !== 0 ? 1 : failed };
}

function anyFailed(assertionResults = []) {
  return assertionResults.some(({ status }) => status === 'failed');
}

/** True unless the arguments name tests that all do without the built shop. */
export function needsBuild(asked) {
  const places = asked.filter((argument) => !argument.startsWith('-'));
  return places.length === 0 || places.some((place) => place.includes('e2e'));
}
