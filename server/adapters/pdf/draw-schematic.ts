import type { Drawing, DrawingItem, PartSymbol } from '../../contracts/drawing.ts';
import { ink, write, type Sheet } from './paper.ts';

type Point = [number, number];

/** Draws a schematic from its data with the top left corner at (x, y); returns the y below it. */
export function drawSchematic(
  sheet: Sheet,
  drawing: Drawing,
  x: number,
  y: number,
  width: number,
): number {
  const scale = width / drawing.width;
  sheet.save().translate(x, y).scale(scale);
  sheet.lineJoin('round').lineCap('round');
  for (const item of drawing.items) drawItem(sheet, item);
  sheet.restore();
  return y + drawing.height * scale;
}

function drawItem(sheet: Sheet, item: DrawingItem): void {
  sheet.lineWidth(1.6).strokeColor(ink.text).fillColor(ink.text);
  switch (item.kind) {
    case 'wire':
      line(sheet, item.points);
      return;
    case 'dot':
      sheet.circle(...item.at, 3.4).fill();
      return;
    case 'ground':
      drawGround(sheet, item.at);
      return;
    case 'label':
      drawLabel(sheet, item);
      return;
    case 'comparator':
      drawComparator(sheet, item);
      return;
    case 'part':
      drawPart(sheet, item);
  }
}

function line(sheet: Sheet, points: Point[]): void {
  points.forEach((point, k) => (k === 0 ? sheet.moveTo(...point) : sheet.lineTo(...point)));
  sheet.stroke();
}

function drawGround(sheet: Sheet, [x, y]: Point): void {
  [16, 10, 4].forEach((half, k) =>
    line(sheet, [
      [x - half, y + 5 * k],
      [x + half, y + 5 * k],
    ]),
  );
}

function drawLabel(sheet: Sheet, item: Extract<DrawingItem, { kind: 'label' }>): void {
  const size = 14;
  const width = 200;
  const align = item.anchor === 'start' ? 'left' : item.anchor === 'end' ? 'right' : 'center';
  const left = item.anchor === 'start' ? 0 : item.anchor === 'end' ? width : width / 2;
  write(sheet, item.text, item.at[0] - left, item.at[1] - size * 0.98, {
    size,
    weight: item.weight === 'strong' ? 800 : 400,
    width,
    align,
  });
}

function drawComparator(sheet: Sheet, item: Extract<DrawingItem, { kind: 'comparator' }>): void {
  const [x, y] = item.at;
  const half = item.height / 2;
  sheet.polygon([x, y - half], [x, y + half], [x + item.width, y]);
  sheet.lineWidth(1.8).stroke();
  const plus = item.invertingAbove ? y + half / 2 : y - half / 2;
  const minus = item.invertingAbove ? y - half / 2 : y + half / 2;
  line(sheet, [
    [x + 8, plus],
    [x + 18, plus],
  ]);
  line(sheet, [
    [x + 13, plus - 5],
    [x + 13, plus + 5],
  ]);
  line(sheet, [
    [x + 8, minus],
    [x + 18, minus],
  ]);
}

/** Half the length of a symbol's body; wires make up the rest. */
const halfBody: Record<PartSymbol, number> = {
  resistor: 22,
  trimmer: 22,
  capacitor: 4,
  'polarised-capacitor': 4,
  diode: 9,
  led: 9,
};

/** Draws a two-ended part in a frame whose x axis runs from one end to the other. */
function drawPart(sheet: Sheet, item: Extract<DrawingItem, { kind: 'part' }>): void {
  const [dx, dy] = [item.to[0] - item.from[0], item.to[1] - item.from[1]];
  const length = Math.hypot(dx, dy);
  sheet
    .save()
    .translate(...item.from)
    .rotate((Math.atan2(dy, dx) * 180) / Math.PI);
  const middle = length / 2;
  const body = halfBody[item.symbol];
  line(sheet, [
    [0, 0],
    [middle - body, 0],
  ]);
  line(sheet, [
    [middle + body, 0],
    [length, 0],
  ]);
  if (item.symbol === 'resistor' || item.symbol === 'trimmer') {
    drawZigzag(sheet, middle - body, middle + body);
    if (item.symbol === 'trimmer') drawAdjustment(sheet, middle);
  } else if (item.symbol === 'led' || item.symbol === 'diode')
    drawDiode(sheet, middle, item.symbol === 'led');
  else drawPlates(sheet, middle, item.symbol === 'polarised-capacitor');
  sheet.restore();
}

function drawZigzag(sheet: Sheet, from: number, to: number): void {
  const step = (to - from) / 12;
  const points: Point[] = [[from, 0]];
  for (let k = 0; k < 6; k += 1) points.push([from + (2 * k + 1) * step, k % 2 === 0 ? -8 : 8]);
  points.push([to, 0]);
  line(sheet, points);
}

/** The slant with its bar across that says: set once with a screwdriver. */
function drawAdjustment(sheet: Sheet, at: number): void {
  line(sheet, [
    [at - 13, 15],
    [at + 13, -15],
  ]);
  line(sheet, [
    [at + 8, -19.4],
    [at + 18, -10.6],
  ]);
}

function drawPlates(sheet: Sheet, at: number, polarised: boolean): void {
  line(sheet, [
    [at - 4, -15],
    [at - 4, 15],
  ]);
  line(sheet, [
    [at + 4, -15],
    [at + 4, 15],
  ]);
  if (!polarised) return;
  line(sheet, [
    [at - 14, -14],
    [at - 14, -6],
  ]);
  line(sheet, [
    [at - 18, -10],
    [at - 10, -10],
  ]);
}

function drawDiode(sheet: Sheet, at: number, shines: boolean): void {
  sheet.polygon([at - 9, -10], [at - 9, 10], [at + 9, 0]).stroke();
  line(sheet, [
    [at + 9, -10],
    [at + 9, 10],
  ]);
  if (!shines) return;
  for (const shift of [-4, 5]) {
    line(sheet, [
      [at + shift, -14],
      [at + shift + 7, -23],
    ]);
    line(sheet, [
      [at + shift + 3, -22],
      [at + shift + 7, -23],
      [at + shift + 7, -19],
    ]);
  }
}
