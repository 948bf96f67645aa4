import { render, screen } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { Causes } from '../../../client/features/packs/components/causes.tsx';
import { Making } from '../../../client/features/packs/components/making.tsx';
import { SupplyCurrent } from '../../../client/features/packs/components/supply-current.tsx';
import { narrow } from '../../../client/lib/spaces.ts';
import type { PackPage } from '../../../server/contracts/packs.ts';
import { samplePack } from '../support/sample-pack.ts';
import '../support/render.tsx';

const causes: PackPage['causes'] = [
  { role: 'C1', label: 'Capacitor C1', fraction: 0.026 },
  { role: '°C', label: 'Temperature', fraction: 0.004 },
  { role: 'V+', label: 'Supply', fraction: 3e-6 },
];
const supply: PackPage['supply'] = {
  causes: [
    { code: 'load', label: 'LED', amps: 1e-3 },
    { code: 'timing', label: 'Charging C1', amps: 7.1e-7 },
  ],
  totalAmps: 1.00071e-3,
  batteryHours: 2400,
  text: '1 mA on average: a fresh set of cells lasts about 3.2 months.',
};

function pageOf(change: Partial<PackPage>): PackPage {
  const pack = samplePack('a', 0.03, 485);
  const shelf = { pack, causes, supply, causesText: 'The capacitor makes 87 % of the spread.' };
  return { ...shelf, ...change } as PackPage;
}

const rows = () =>
  screen
    .getAllByRole<HTMLTableRowElement>('row')
    .map((row) => [...row.cells].map((cell) => cell.textContent));

describe('SupplyCurrent', () => {
  it('says how long the cells last, then where the current goes, as a table that adds up', () => {
    render(<SupplyCurrent page={pageOf({})} />);
    expect(screen.getByRole('heading').textContent).toBe(
      `Draws 1${narrow}mA on average: a fresh set of cells lasts about 3.2 months.`,
    );
    expect(rows().slice(1)).toEqual([
      ['LED', `1${narrow}mA`],
      ['Charging C1', `710${narrow}nA`],
      ['Together', `1${narrow}mA`],
    ]);
  });
});

describe('Causes', () => {
  it('gives each cause its figure, and none to one that is next to nothing', () => {
    render(<Causes page={pageOf({})} />);
    expect(rows().slice(1)).toEqual([
      ['C1 Capacitor C1', `±${narrow}2.6${narrow}%`],
      ['°C Temperature', `±${narrow}0.4${narrow}%`],
      ['V+ Supply', `under 0.01${narrow}%`],
    ]);
  });

  it('draws the bars in proportion', () => {
    const { container } = render(<Causes page={pageOf({})} />);
    const widths = [...container.querySelectorAll('rect')].map((bar) =>
      Number(bar.getAttribute('width')),
    );
    expect(widths[0]).toBe(100);
    expect(widths[1]).toBeCloseTo(15.4, 1);
  });
});

describe('Making', () => {
  it('says why, how the kit is treated, and what to know of it', () => {
    const notes = [{ code: 'drift', text: 'R4 and C1 together drift 450 ppm for each kelvin.' }];
    const pack = samplePack('a', 0.03, 485, { notes, careLevel: 'bench-tuned', join: 'series' });
    render(<Making pack={pack} />);
    expect(screen.getByText(pack.why)).toBeTruthy();
    expect(screen.getByText(/R4A and R4B are chosen for it/)).toBeTruthy();
    expect(screen.getAllByRole('listitem').map((item) => item.textContent)).toEqual([
      notes[0]!.text,
    ]);
  });

  it('has no list where there is nothing to note', () => {
    render(<Making pack={samplePack('a', 0.03, 485)} />);
    expect(screen.queryByRole('list')).toBeNull();
    expect(screen.getByText('As stocked')).toBeTruthy();
  });
});
