import { render, screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { useState } from 'react';
import { describe, expect, it } from 'vitest';
import { CareChoice } from '../../../client/features/brief/components/care-choice.tsx';
import { defaultDraft, readDraft } from '../../../client/features/brief/model.ts';
import { sampleShop } from '../support/render.tsx';

function Harness() {
  const [draft, setDraft] = useState(defaultDraft);
  return (
    <>
      <CareChoice draft={draft} change={(patch) => setDraft({ ...draft, ...patch })} />
      <output>{readDraft(draft, sampleShop).request?.careLevel}</output>
    </>
  );
}

describe('CareChoice', () => {
  it('offers all four levels, each with what it means', () => {
    render(<Harness />);
    expect(screen.getByRole('group', { name: 'Care level' })).toBeTruthy();
    const levels = screen.getAllByRole<HTMLInputElement>('radio');
    expect(levels.map((level) => [level.value, level.checked, level.disabled])).toEqual([
      ['as-stocked', true, false],
      ['lot-checked', false, false],
      ['bench-tuned', false, false],
      ['trimmer-fitted', false, false],
    ]);
    for (const level of levels) {
      const meaning = document.getElementById(level.getAttribute('aria-describedby') ?? '');
      expect(meaning?.textContent).toMatch(/^[A-Z].+\.$/);
    }
  });

  it('changes what the shop is asked', async () => {
    render(<Harness />);
    await userEvent.click(screen.getByRole('radio', { name: 'Bench-tuned' }));
    expect(screen.getByRole('status').textContent).toBe('bench-tuned');
    await userEvent.click(screen.getByText('Trimmer fitted'));
    expect(screen.getByRole('status').textContent).toBe('trimmer-fitted');
  });
});
