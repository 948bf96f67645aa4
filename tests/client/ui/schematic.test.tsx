import { fireEvent, render, screen } from '@testing-library/react';
import { describe, expect, it, vi } from 'vitest';
import { Schematic } from '../../../client/ui/schematic.tsx';
import { viewBoxOf } from '../../../client/ui/schematic-bounds.ts';
import type { Drawing, PartSymbol } from '../../../server/contracts/drawing.ts';
import '../support/render.tsx';

const drawingOf = (symbol: PartSymbol): Drawing => ({
  width: 640,
  height: 440,
  items: [
    { kind: 'part', symbol, role: 'X1', from: [100, 100], to: [200, 100] },
    { kind: 'label', at: [630, 300], text: 'a long name', anchor: 'start', weight: 'strong' },
  ],
  description: [],
});

describe('Schematic', () => {
  it('draws a trimmer as a resistor with a slant across', () => {
    const paths = (symbol: PartSymbol) =>
      render(<Schematic drawing={drawingOf(symbol)} label={symbol} />).container.querySelectorAll(
        'path',
      ).length;
    expect(paths('trimmer')).toBe(paths('resistor') + 1);
  });

  it('sets a diode’s bar at the end it runs to, its cathode', () => {
    const { container } = render(<Schematic drawing={drawingOf('diode')} label="diode" />);
    const bar = [...container.querySelectorAll('path')].find((path) =>
      path.getAttribute('d')?.includes('M60 -10V10'),
    );
    expect(bar).toBeTruthy();
  });

  it('lights the part under the pointer', () => {
    const onLight = vi.fn();
    render(<Schematic drawing={drawingOf('resistor')} onLight={onLight} label="drawing" />);
    fireEvent.pointerEnter(screen.getByRole('img').querySelector('g')!);
    expect(onLight).toHaveBeenCalledWith('X1');
  });

  it('keeps lettering that stands past the sheet inside the picture', () => {
    const [left, , width] = viewBoxOf(drawingOf('resistor')).split(' ').map(Number);
    expect(left! + width!).toBeGreaterThan(630 + 11 * 8);
  });
});
