import { render, screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { describe, expect, it, vi } from 'vitest';
import { Button } from '../../../client/ui/button.tsx';
import { Field } from '../../../client/ui/field.tsx';
import { Scale } from '../../../client/ui/scale.tsx';
import { Stepper } from '../../../client/ui/stepper.tsx';
import { niceTicks } from '../../../client/ui/axis.ts';
import { narrow } from '../../../client/lib/spaces.ts';
import '../support/render.tsx';

describe('Button', () => {
  it('does nothing while busy, keeps its focus and says what is going on', async () => {
    const onClick = vi.fn();
    render(
      <Button busy busyWords="Reserving your parts" onClick={onClick}>
        Order and pay
      </Button>,
    );
    await userEvent.click(screen.getByRole('button', { name: 'Reserving your parts' }));
    expect(onClick).not.toHaveBeenCalled();
    expect(screen.getByRole('button').hasAttribute('disabled')).toBe(false);
  });
});

describe('Field', () => {
  it('ties its hint and its error to the control', () => {
    render(<Field label="E-mail" hint="For the confirmation." error="The address is missing." />);
    const input = screen.getByLabelText('E-mail');
    expect(input.getAttribute('aria-invalid')).toBe('true');
    const described = input.getAttribute('aria-describedby')?.split(' ') ?? [];
    const words = described.map((id) => document.getElementById(id)?.textContent);
    expect(words).toEqual(['For the confirmation.', 'The address is missing.']);
  });
});

describe('Stepper', () => {
  it('steps by one and stops at its bounds', async () => {
    const onCommit = vi.fn();
    render(<Stepper label="Kits" value={1} min={1} max={5} onCommit={onCommit} />);
    expect(screen.getByRole('button', { name: 'Kits: one fewer' }).hasAttribute('disabled')).toBe(
      true,
    );
    await userEvent.click(screen.getByRole('button', { name: 'Kits: one more' }));
    expect(onCommit).toHaveBeenCalledWith(2);
  });

  it('takes a typed number when Enter is pressed, held inside its bounds', async () => {
    const onCommit = vi.fn();
    render(<Stepper label="Kits" value={1} min={1} max={5} onCommit={onCommit} />);
    const input = screen.getByRole('textbox', { name: 'Kits' });
    await userEvent.clear(input);
    await userEvent.type(input, '40{Enter}');
    expect(onCommit).toHaveBeenCalledExactlyOnceWith(5);
  });

  it('ignores what is no number', async () => {
    const onCommit = vi.fn();
    render(<Stepper label="Kits" value={2} min={1} max={5} onCommit={onCommit} />);
    const input = screen.getByRole('textbox', { name: 'Kits' });
    await userEvent.clear(input);
    await userEvent.type(input, 'many');
    await userEvent.tab();
    expect(onCommit).not.toHaveBeenCalled();
    expect((input as HTMLInputElement).value).toBe('2');
  });
});

describe('Scale', () => {
  it('says in words what the picture shows', () => {
    render(<Scale asked={0.05} error={0.001} low={-0.044} high={0.048} />);
    const name = screen.getByRole('img').getAttribute('aria-label')?.replaceAll(narrow, ' ');
    expect(name).toBe(
      'Every kit stays between − 4.4 % and + 4.8 % of the rate asked for; nominal + 0.1 %; asked for ± 5 %.',
    );
  });

  it('marks the part beyond the band that was asked for', () => {
    const within = render(<Scale asked={0.05} error={0} low={-0.04} high={0.04} />);
    expect(within.container.querySelector('.stroke-brick')).toBeNull();
    const beyond = render(<Scale asked={0.05} error={0} low={-0.08} high={0.04} />);
    expect(beyond.container.querySelector('.stroke-brick')).not.toBeNull();
  });
});

describe('niceTicks', () => {
  it('divides a span into round steps', () => {
    expect(niceTicks(0, 2.6, 5)).toEqual([0, 1, 2]);
    expect(niceTicks(0, 1, 5)).toEqual([0, 0.2, 0.4, 0.6, 0.8, 1]);
  });
});
