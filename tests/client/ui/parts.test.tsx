import { readFileSync } from 'node:fs';
import { render, screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { describe, expect, it, vi } from 'vitest';
import { bandColours } from '../../../client/ui/band-colours.ts';
import { BandNames } from '../../../client/ui/band-names.tsx';
import { groupParts, rolesText } from '../../../client/ui/part-groups.ts';
import { PartsTable } from '../../../client/ui/parts-table.tsx';
import { ResistorDrawing } from '../../../client/ui/resistor-drawing.tsx';
import { samplePack, samplePart } from '../support/sample-pack.ts';
import '../support/render.tsx';

describe('band colours', () => {
  it('have a paint for every colour of IEC 60062', () => {
    const table = readFileSync('tests/fixtures/reference/resistor_colour_code.csv', 'utf8');
    const colours = table
      .trim()
      .split('\n')
      .slice(1)
      .map((row) => row.split(',')[0] ?? '')
      .filter((colour) => colour !== 'none');
    expect(colours.length).toBeGreaterThanOrEqual(12);
    for (const colour of colours) expect(bandColours).toHaveProperty(colour);
  });
});

describe('ResistorDrawing', () => {
  it('paints each band in its colour, in order', () => {
    const bands = ['grey', 'grey', 'violet', 'orange', 'brown'];
    const { container } = render(
      <ResistorDrawing bands={bands} code={null} surfaceMount={false} />,
    );
    const painted = [...container.querySelectorAll('rect')].map((rect) =>
      rect.getAttribute('fill'),
    );
    expect(painted).toEqual(bands.map((band) => bandColours[band]));
  });

  it('prints the code on a chip', () => {
    const { container } = render(<ResistorDrawing bands={null} code="92D" surfaceMount />);
    expect(container.textContent).toBe('92D');
  });
});

describe('BandNames', () => {
  it('says every colour in words, for those who cannot tell them', () => {
    render(<BandNames marking={samplePart({ role: 'R4' }).marking} />);
    expect(screen.getAllByText(/brown|black|yellow/)).toHaveLength(5);
  });
});

describe('rolesText', () => {
  it('joins a run and lists the rest', () => {
    expect(rolesText(['R1', 'R2', 'R3'])).toBe('R1–R3');
    expect(rolesText(['R1', 'R4'])).toBe('R1, R4');
    expect(rolesText(['R1', 'R2', 'R3', 'R4B'])).toBe('R1–R3, R4B');
    expect(rolesText(['C1'])).toBe('C1');
  });
});

describe('groupParts', () => {
  it('puts pieces of one stock number on one line and adds them up', () => {
    const groups = groupParts(samplePack('a', 0.05, 485).parts);
    expect(groups.map((group) => [group.roles.join(), group.quantity])).toEqual([
      ['R1,R2,R3', 3],
      ['R4', 1],
      ['C1', 1],
    ]);
  });
});

describe('PartsTable', () => {
  it('lights all roles of a line when its code is focused', async () => {
    const onLight = vi.fn();
    render(
      <PartsTable parts={samplePack('a', 0.05, 485).parts} onLight={onLight} caption="Parts" />,
    );
    await userEvent.tab();
    expect(document.activeElement?.textContent).toBe('R1–R3');
    expect(onLight).toHaveBeenLastCalledWith(['R1', 'R2', 'R3']);
  });
});
