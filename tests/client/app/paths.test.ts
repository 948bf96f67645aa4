import { matchPath, matchRoutes } from 'react-router-dom';
import { describe, expect, it } from 'vitest';
import { paths, safeNext } from '../../../client/app/paths.ts';
import { mayUseBench, mayUseDesk } from '../../../client/lib/permissions.ts';

describe('paths', () => {
  it('builds links that their own patterns match, whatever stands in them', () => {
    const token = 'a/b?c#d é';
    const pathname = new URL(paths.pack.link(token, 3), 'http://x').pathname;
    expect(matchRoutes([{ path: paths.pack.pattern }], pathname)?.[0]?.params.token).toBe(token);
    const sheet = new URL(paths.buildSheet.link('TK-1', '7', 'guest'), 'http://x');
    expect(matchPath(paths.buildSheet.pattern, sheet.pathname)?.params).toEqual({
      ref: 'TK-1',
      lineId: '7',
    });
    expect(sheet.searchParams.get('token')).toBe('guest');
  });
});

describe('safeNext', () => {
  it('goes on to a page of this shop', () => {
    expect(safeNext('/orders?page=2')).toBe('/orders?page=2');
  });

  it.each([null, '', 'https://elsewhere.example', '//elsewhere.example', '/\\elsewhere.example'])(
    'goes home for %s',
    (next) => {
      expect(safeNext(next)).toBe('/');
    },
  );
});

describe('after signing in from nowhere in particular', () => {
  it.each([
    ['customer', '/'],
    ['packer', '/bench'],
    ['owner', '/desk'],
  ] as const)('a %s lands on %s', (role, home) => {
    expect(safeNext(null, role)).toBe(home);
    expect(safeNext('/basket', role)).toBe('/basket');
  });
});

describe('what a role may open', () => {
  it.each([
    [null, false, false],
    [{ role: 'customer' as const }, false, false],
    [{ role: 'packer' as const }, true, false],
    [{ role: 'owner' as const }, true, true],
  ])('%j: bench %s, desk %s', (person, bench, desk) => {
    expect([mayUseBench(person), mayUseDesk(person)]).toEqual([bench, desk]);
  });
});
