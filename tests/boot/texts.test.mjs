import { describe, expect, it } from 'vitest';
import { cleanDump, firstDifference } from '../../server/boot/schema-text.mjs';
import { needsBuild, tallyOf } from '../../server/boot/test-tally.mjs';

describe('cleanDump', () => {
  it('drops comments, settings and tokens, which differ from one run to the next', () => {
    const dump = [
      '-- Dumped by pg_dump version 15.3',
      '\\restrict x1',
      'SET lock_timeout = 0;',
      "SELECT pg_catalog.set_config('search_path', '', false);",
      '',
      '',
      '',
      'CREATE TABLE public.parts (',
      '    id bigint',
      ');',
      '\\unrestrict x1',
      '',
    ];
    expect(cleanDump(dump.join('\n'))).toBe('CREATE TABLE public.parts (\n    id bigint\n);\n');
  });
});

describe('firstDifference', () => {
  it('points at the first line that parts', () => {
    expect(firstDifference('a\nb\n', 'a\nc\n')).toBe('line 2\n- b\n+ c');
    expect(firstDifference('', 'a\n')).toBe('line 1\n- \n+ a');
  });
});

describe('tallyOf', () => {
  const passing = { status: 'passed', assertionResults: [{ status: 'passed' }] };
  const failing = { status: 'failed', assertionResults: [{ status: 'failed' }] };
  const unloaded = { status: 'failed', assertionResults: [] };

  it.each([
    ['all pass', { numPassedTests: 5, numFailedTests: 0, testResults: [passing] }, 0, [5, 0]],
    ['one fails', { numPassedTests: 5, numFailedTests: 1, testResults: [failing] }, 1, [5, 1]],
    [
      'a file is broken',
      { numPassedTests: 5, numFailedTests: 0, testResults: [unloaded] },
      1,
      [5, 1],
    ],
    ['there is no report', null, 1, [0, 1]],
    [
      'the run fails otherwise',
      { numPassedTests: 5, numFailedTests: 0, testResults: [] },
      1,
      [5, 1],
    ],
  ])('when %s', (_what, report, exitCode, [passed, failed]) => {
    expect(tallyOf(report, exitCode)).toEqual({ passed, failed });
  });
});

describe('needsBuild', () => {
  it.each([
    [[], true],
    [['tests/engine'], false],
    [['tests/engine', 'tests/e2e/maker.test.ts'], true],
    [['--coverage'], true],
    [['--coverage', 'tests/domain'], false],
  ])('for %j is %s', (asked, needed) => {
    expect(needsBuild(asked)).toBe(needed);
  });
});
