import type { PackPart } from '../../contracts/packs.ts';
import { ink, write, type Sheet } from './paper.ts';

/** Colours of IEC 60062 as printed; the names stand beside them. */
const bandColours: Record<string, string> = {
  black: '#1c1c1c',
  brown: '#7a4a21',
  red: '#c0281c',
  orange: '#e8791a',
  yellow: '#f0cf2b',
  green: '#2e8b48',
  blue: '#2457b5',
  violet: '#7b3fa0',
  grey: '#8b8f92',
  white: '#ffffff',
  gold: '#c79a2c',
  silver: '#b9bfc4',
  pink: '#ef9ab4',
};

/** A part as it lies on the bench, in a frame of 92 × 22 points. */
export function drawComponent(sheet: Sheet, part: PackPart, x: number, y: number): void {
  sheet.save().translate(x, y).lineWidth(0.8).strokeColor(ink.text);
  if (part.marking.bands) drawBanded(sheet, part.marking.bands);
  else if (part.kind === 'resistor') drawBlock(sheet, part.marking.code ?? '', 34);
  else if (part.kind === 'capacitor') drawBlock(sheet, part.marking.code ?? '', 54);
  else if (part.kind === 'comparator') drawChip(sheet, part.marking.code ?? '');
  else if (part.kind === 'led') drawLamp(sheet);
  else if (part.kind === 'diode') drawDiode(sheet);
  else if (part.kind === 'trimmer') drawTrimmer(sheet, part.marking.code ?? '');
  sheet.restore();
}

function drawBanded(sheet: Sheet, bands: readonly string[]): void {
  sheet.moveTo(0, 11).lineTo(92, 11).stroke();
  sheet.roundedRect(16, 3, 60, 16, 7).fillAndStroke('#EFE3C8', ink.text);
  bands.forEach((band, k) => {
    const last = k === bands.length - 1;
    // The gap before the tolerance band tells which end to read from.
    const left = last ? 65 : 22 + k * 9;
    sheet.rect(left, 3, 5.5, 16).fillAndStroke(bandColours[band] ?? '#ffffff', ink.text);
  });
}

function drawBlock(sheet: Sheet, code: string, width: number): void {
  const left = (92 - width) / 2;
  sheet.rect(left, 2, width, 18).fillAndStroke('#ffffff', ink.text);
  write(sheet, code, left - 20, 5, { size: 9, weight: 600, width: width + 40, align: 'center' });
}

function drawChip(sheet: Sheet, code: string): void {
  for (let k = 0; k < 4; k += 1) {
    sheet.rect(23 + k * 13, 0, 5, 22).fillAndStroke('#dddddd', ink.text);
  }
  sheet.rect(16, 3, 60, 16).fillAndStroke('#ffffff', ink.text);
  sheet.circle(21, 15, 1.6).fillAndStroke(ink.text, ink.text);
  write(sheet, code, 6, 6, { size: 8, weight: 600, width: 80, align: 'center' });
}

function drawLamp(sheet: Sheet): void {
  sheet.path('M 34 4 L 50 4 A 7 7 0 0 1 50 18 L 34 18 Z').fillAndStroke('#ffffff', ink.text);
  sheet.rect(31, 2, 3, 18).fillAndStroke('#ffffff', ink.text);
  sheet.moveTo(31, 8).lineTo(6, 8).moveTo(31, 15).lineTo(14, 15).stroke();
}

/** The band stands at the cathode's end. */
function drawDiode(sheet: Sheet): void {
  sheet.moveTo(0, 11).lineTo(92, 11).stroke();
  sheet.rect(28, 4, 36, 14).fillAndStroke('#ffffff', ink.text);
  sheet.rect(55, 4, 4.5, 14).fillAndStroke(ink.text, ink.text);
}

function drawTrimmer(sheet: Sheet, code: string): void {
  sheet.rect(22, 1, 20, 20).fillAndStroke('#ffffff', ink.text);
  sheet.circle(32, 11, 6.5).stroke();
  sheet.moveTo(27.5, 15.5).lineTo(36.5, 6.5).stroke();
  write(sheet, code, 46, 5, { size: 9, weight: 600, width: 40 });
}
