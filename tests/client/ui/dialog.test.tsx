import { cleanup, createEvent, fireEvent, render, screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { useState } from 'react';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { Dialog } from '../../../client/ui/dialog.tsx';
import { openDialogs } from '../support/dialog.ts';

afterEach(cleanup);
beforeEach(async () => {
  openDialogs();
  render(<Harness />);
  await userEvent.click(screen.getByRole('button', { name: 'Ask' }));
});

function Harness() {
  const [open, setOpen] = useState(false);
  return (
    <>
      <button type="button" onClick={() => setOpen(true)}>
        Ask
      </button>
      <Dialog open={open} onOpenChange={setOpen} title="Refund it?" description="All of it.">
        <button type="button">Yes</button>
      </Dialog>
    </>
  );
}

describe('a dialog', () => {
  it('carries its title and its description', () => {
    const dialog = screen.getByRole('dialog', { name: 'Refund it?' });
    const described = dialog.getAttribute('aria-describedby') ?? '';
    expect(document.getElementById(described)?.textContent).toBe('All of it.');
  });

  it('closes on Escape, which browsers hand on as a cancel event', () => {
    const dialog = screen.getByRole('dialog');
    fireEvent(dialog, createEvent('cancel', dialog, { cancelable: true }));
    expect(screen.queryByRole('dialog')).toBeNull();
  });

  it('closes on its cross', async () => {
    await userEvent.click(screen.getByRole('button', { name: 'Close' }));
    expect(screen.queryByRole('dialog')).toBeNull();
  });

  it('closes on the ground beside it, and not on what it holds', () => {
    fireEvent.pointerDown(screen.getByRole('button', { name: 'Yes' }));
    fireEvent.pointerDown(screen.getByRole('dialog'));
    expect(screen.queryByRole('dialog')).toBeNull();
  });
});
