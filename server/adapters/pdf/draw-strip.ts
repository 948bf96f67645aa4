import type { PulseStripData } from '../../contracts/drawing.ts';
import { ink, type Sheet } from './paper.ts';

interface Box {
  x: number;
  y: number;
  width: number;
  height: number;
}

/** Draws two periods of output (filled, heavy) and capacitor (fine) between dashed thresholds. */
export function drawStrip(sheet: Sheet, strip: PulseStripData, box: Box): void {
  const at = ([x, y]: [number, number]): [number, number] => [
    box.x + x * box.width,
    box.y + (1 - y) * box.height,
  ];
  const trace = (points: [number, number][]) => {
    points.forEach((point, k) =>
      k === 0 ? sheet.moveTo(...at(point)) : sheet.lineTo(...at(point)),
    );
  };
  sheet.save();
  trace(strip.output);
  const [first, last] = [strip.output[0], strip.output[strip.output.length - 1]];
  if (first && last) sheet.lineTo(...at([last[0], 0])).lineTo(...at([first[0], 0]));
  sheet.fillColor(ink.spruce, 0.12).fill();
  trace(strip.output);
  sheet.lineWidth(1.4).strokeColor(ink.spruce).stroke();
  for (const level of strip.thresholds) {
    const [, y] = at([0, level]);
    sheet
      .moveTo(box.x, y)
      .lineTo(box.x + box.width, y)
      .dash(1.5, { space: 3 });
    sheet.lineWidth(0.5).strokeColor(ink.soft).stroke().undash();
  }
  trace(strip.capacitor);
  sheet.lineWidth(0.9).strokeColor(ink.slate).stroke();
  sheet.restore();
}
