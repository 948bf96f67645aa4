import { act, cleanup, fireEvent, render, screen } from '@testing-library/react';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { afterEach, describe, expect, it } from 'vitest';
import { useBrief } from '../../../client/features/brief/use-brief.ts';

afterEach(cleanup);

function Harness() {
  const { draft, settled, change } = useBrief();
  return (
    <>
      <input
        aria-label="Rate"
        value={draft.rate}
        onChange={(event) => change({ rate: event.target.value })}
      />
      <output>{settled.rate}</output>
    </>
  );
}

function open(address: string) {
  const router = createMemoryRouter([{ path: '/', element: <Harness /> }], {
    initialEntries: [address],
  });
  render(<RouterProvider router={router} />);
  return router;
}

const rate = () => screen.getByLabelText<HTMLInputElement>('Rate').value;
const type = (value: string) =>
  fireEvent.change(screen.getByLabelText('Rate'), { target: { value } });

describe('useBrief', () => {
  it('reads the brief from the address', () => {
    open('/?rate=33&unit=Hz');
    expect(rate()).toBe('33');
  });

  it('writes the address once the typing rests, and not before', async () => {
    const router = open('/');
    for (const text of ['', '1', '12', '120']) type(text);
    expect(router.state.location.search).toBe('');
    expect(screen.getByRole('status').textContent).toBe('90');
    await act(() => new Promise((resolve) => setTimeout(resolve, 300)));
    expect(router.state.location.search).toBe('?rate=120&unit=per_minute');
    expect(screen.getByRole('status').textContent).toBe('120');
    expect(rate()).toBe('120');
  });

  it('follows a link to another brief', async () => {
    const router = open('/?rate=33&unit=Hz');
    await act(() => router.navigate('/?rate=7&unit=Hz'));
    expect(rate()).toBe('7');
  });
});
