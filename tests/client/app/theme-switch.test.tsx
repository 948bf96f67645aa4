import { render, screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { beforeEach, describe, expect, it } from 'vitest';
import { ThemeSwitch } from '../../../client/app/layout/theme-switch.tsx';
import { stubMedia } from '../support/render.tsx';

describe('ThemeSwitch', () => {
  beforeEach(() => {
    delete document.documentElement.dataset.theme;
    localStorage.clear();
  });

  it('starts from what the system asks for', () => {
    stubMedia(true);
    render(<ThemeSwitch />);
    expect(screen.getByRole('button', { name: 'Day light' })).toBeTruthy();
  });

  it('changes the page at once and remembers the choice', async () => {
    stubMedia(false);
    render(<ThemeSwitch />);
    await userEvent.click(screen.getByRole('button', { name: 'Night bench' }));
    expect(document.documentElement.dataset.theme).toBe('dark');
    expect(localStorage.getItem('tockwell-theme')).toBe('dark');
    expect(screen.getByRole('button', { name: 'Day light' })).toBeTruthy();
  });
});
