import { act, screen } from '@testing-library/react';
import { describe, expect, it, vi } from 'vitest';
import { LampPreview } from '../../../client/features/packs/components/lamp-preview.tsx';
import { renderInShop, stubMedia } from '../support/render.tsx';

const litLamps = () => document.querySelectorAll('.fill-marigold').length;

describe('LampPreview', () => {
  describe('when the kit is faster than three flashes a second', () => {
    it('shows no lamp and says why', () => {
      stubMedia(false);
      renderInShop(<LampPreview frequencyHz={3.01} duty={0.5} />);
      expect(screen.queryByRole('button')).toBeNull();
      expect(screen.getByText(/more than three times a second/)).toBeTruthy();
    });
  });

  describe('when the kit is slow enough', () => {
    it('stays dark until asked, then lights, and stops again', () => {
      stubMedia(true);
      vi.useFakeTimers();
      renderInShop(<LampPreview frequencyHz={1} duty={0.5} />);
      act(() => void vi.advanceTimersByTime(3000));
      expect(litLamps()).toBe(0);
      act(() => screen.getByRole('button', { name: 'Show the pace on a lamp' }).click());
      act(() => void vi.advanceTimersByTime(100));
      expect(litLamps()).toBeGreaterThan(0);
      act(() => void vi.advanceTimersByTime(600));
      expect(litLamps()).toBe(0);
      act(() => void vi.advanceTimersByTime(400));
      act(() => screen.getByRole('button', { name: 'Stop the lamp' }).click());
      expect(litLamps()).toBe(0);
      vi.useRealTimers();
    });
  });
});
