import type { BuildSheet } from '../../contracts/orders.ts';
import { drawComponent } from './draw-component.ts';
import { drawSchematic } from './draw-schematic.ts';
import { drawStrip } from './draw-strip.ts';
import { area, finish, ink, openSheet, rule, write, type Sheet } from './paper.ts';

const width = area.right - area.left;

/** A build sheet on paper: the tag and its promise, parts, schematic, assembly, readings, cautions. */
export function printBuildSheet(sheet: BuildSheet): Promise<Buffer> {
  const paper = openSheet(`Build sheet ${sheet.identifier}`);
  let y = printTag(paper, sheet);
  y = printParts(paper, sheet, y + 14);
  y = printSchematic(paper, sheet, y + 16);
  y = printSteps(paper, sheet, roomFor(paper, y + 8, 260));
  y = printReadings(paper, sheet, y + 16);
  printCautions(paper, sheet, y + 16);
  numberPages(paper, sheet);
  return finish(paper);
}

/** The y to go on at: the same, or the top of a new page when there is not enough room below. */
function roomFor(paper: Sheet, y: number, height: number): number {
  if (y + height <= area.bottom) return y;
  paper.addPage();
  return area.top;
}

function heading(paper: Sheet, text: string, y: number): number {
  const below = write(paper, text, area.left, y, { size: 14, weight: 800 });
  rule(paper, below + 1);
  return below + 6;
}

/** Holds a sentence of two lines. */
const tagHeight = 192;

function printTag(paper: Sheet, sheet: BuildSheet): number {
  const top = area.top;
  const { promise } = sheet;
  paper
    .moveTo(area.left + 14, top)
    .lineTo(area.right, top)
    .lineTo(area.right, top + tagHeight)
    .lineTo(area.left, top + tagHeight)
    .lineTo(area.left, top + 14)
    .closePath()
    .lineWidth(1)
    .strokeColor(ink.text)
    .stroke();
  paper.circle(area.left + 22, top + 22, 6).stroke();
  write(paper, 'Tockwell build sheet', area.left + 38, top + 13, { size: 12, weight: 800 });
  write(paper, sheet.identifier, area.left + 38, top + 13, {
    size: 12,
    weight: 600,
    width: width - 52,
    align: 'right',
  });
  drawStrip(paper, sheet.strip, { x: area.left + 14, y: top + 42, width: width - 28, height: 44 });
  const { text } = promise;
  let y = write(paper, `${text.rate} ${text.unit}, ${text.band}`, area.left + 14, top + 96, {
    size: 22,
    weight: 800,
  });
  y = write(
    paper,
    `Every kit stays between ${text.from} and ${text.to} ${text.unit}. Draws about ${text.supply}.`,
    area.left + 14,
    y + 1,
    { size: 10, width: width - 28 },
  );
  write(paper, `${sheet.kits} × ${sheet.sentence}.`, area.left + 14, y + 3, {
    size: 10,
    colour: ink.soft,
    width: width - 28,
  });
  return top + tagHeight;
}

function printParts(paper: Sheet, sheet: BuildSheet, from: number): number {
  let y = heading(paper, 'Parts in the bag, for one kit', from);
  for (const part of sheet.parts) {
    y = roomFor(paper, y, 28);
    paper
      .rect(area.left, y + 5, 11, 11)
      .lineWidth(0.8)
      .strokeColor(ink.text)
      .stroke();
    write(paper, part.role, area.left + 20, y + 4, { size: 11, weight: 800, width: 40 });
    drawComponent(paper, part, area.left + 62, y);
    const text = area.left + 168;
    const half = 150;
    const label = write(paper, part.label, text, y + 5, { size: 9.5, weight: 600, width: half });
    write(paper, part.marking.text, text + half + 10, y + 5, {
      size: 9.5,
      colour: ink.soft,
      width: area.right - text - half - 10,
    });
    y = Math.max(label, paper.y, y + 22) + 2;
  }
  return y;
}

/** A narrow drawing is set at the size of its lettering, a wide one as wide as the sheet. */
const pointsPerUnit = 0.66;

function printSchematic(paper: Sheet, sheet: BuildSheet, from: number): number {
  const { drawing } = sheet;
  const across = Math.min(width, drawing.width * pointsPerUnit);
  const high = (drawing.height / drawing.width) * across;
  const y = heading(paper, 'Schematic', roomFor(paper, from, high + 30));
  return drawSchematic(paper, drawing, area.left + (width - across) / 2, y, across);
}

function printSteps(paper: Sheet, sheet: BuildSheet, from: number): number {
  let y = heading(paper, 'Order of assembly', from);
  sheet.steps.forEach((step, k) => {
    y = roomFor(paper, y, 44);
    paper
      .rect(area.left, y + 3, 11, 11)
      .lineWidth(0.8)
      .strokeColor(ink.text)
      .stroke();
    const roles = step.roles.length > 0 ? ` (${step.roles.join(', ')})` : '';
    const below = write(paper, `${k + 1}. ${step.title}${roles}`, area.left + 20, y, {
      size: 11,
      weight: 800,
    });
    y = write(paper, step.text, area.left + 20, below, { size: 10 }) + 4;
  });
  return y;
}

function printReadings(paper: Sheet, sheet: BuildSheet, from: number): number {
  let y = heading(paper, 'What to measure', roomFor(paper, from, 140));
  for (const reading of sheet.readings) {
    y = roomFor(paper, y, 36);
    const left = write(paper, reading.point, area.left, y, { size: 10, weight: 800, width: 150 });
    const expect = write(paper, reading.expect, area.left + 160, y, {
      size: 10,
      weight: 600,
      width: 347,
    });
    const how = write(paper, reading.how, area.left + 160, expect, {
      size: 9.5,
      colour: ink.soft,
      width: 347,
    });
    y = Math.max(left, how) + 4;
  }
  return y;
}

function printCautions(paper: Sheet, sheet: BuildSheet, from: number): void {
  let y = heading(paper, 'Take care', roomFor(paper, from, 120));
  for (const caution of sheet.cautions) {
    y = roomFor(paper, y, 34);
    paper.moveTo(area.left + 1, y + 2).lineTo(area.left + 1, y + 12);
    paper
      .lineWidth(caution.mustAcknowledge ? 3 : 1.2)
      .strokeColor(ink.text)
      .stroke();
    y =
      write(paper, caution.text, area.left + 10, y, {
        size: 9.5,
        weight: caution.mustAcknowledge ? 800 : 400,
      }) + 3;
  }
  write(
    paper,
    'These cautions inform; local codes and licensed practice come first.',
    area.left + 10,
    y + 2,
    { size: 9.5, colour: ink.soft },
  );
}

function numberPages(paper: Sheet, sheet: BuildSheet): void {
  const { start, count } = paper.bufferedPageRange();
  for (let k = start; k < start + count; k += 1) {
    paper.switchToPage(k);
    // Below the margin: without this, writing there would add a page.
    paper.page.margins.bottom = 0;
    write(
      paper,
      `Order ${sheet.ref}, kit ${sheet.identifier}. Page ${k + 1} of ${count}`,
      area.left,
      area.bottom + 12,
      {
        size: 8.5,
        colour: ink.soft,
      },
    );
  }
}
