import { describe, expect, it } from 'vitest';
import { isSupportedNode } from '../../server/boot/node-version.mjs';
import { satisfiesLock } from '../../server/boot/npm-packages.mjs';

const lock = {
  packages: {
    '': { name: 'tockwell' },
    'node_modules/a': { version: '1.0.0' },
    'node_modules/b': { version: '2.0.0', optional: true },
  },
};

describe('satisfiesLock', () => {
  describe('when every package is there in its version', () => {
    it('is content, optional ones missing or not', () => {
      const installed = { packages: { 'node_modules/a': { version: '1.0.0' } } };
      expect(satisfiesLock(lock, installed)).toBe(true);
      const withBoth = {
        packages: { ...installed.packages, 'node_modules/b': { version: '2.0.0' } },
      };
      expect(satisfiesLock(lock, withBoth)).toBe(true);
    });
  });

  describe('when one is missing, of another version, or nothing was ever installed', () => {
    it('is not', () => {
      const other = { packages: { 'node_modules/a': { version: '1.0.1' } } };
      expect(satisfiesLock(lock, other)).toBe(false);
      expect(satisfiesLock(lock, { packages: {} })).toBe(false);
      expect(satisfiesLock(lock, null)).toBe(false);
    });
  });
});

describe('isSupportedNode', () => {
  it.each([
    ['20.18.3', false],
    ['20.19.0', true],
    ['21.7.0', false],
    ['22.11.0', false],
    ['22.12.0', true],
    ['24.1.0', true],
    ['18.20.4', false],
  ])('answers for %s: %s', (version, supported) => {
    expect(isSupportedNode(version)).toBe(supported);
  });
});
