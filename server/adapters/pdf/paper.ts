import PDFDocument from 'pdfkit';
import { fontFile, fontRuns, type Weight } from './fonts.ts';

export type Sheet = PDFKit.PDFDocument;

/** Ink that survives a black-and-white printer. */
export const ink = {
  text: '#1E2A2E',
  soft: '#54605F',
  line: '#B9AE97',
  spruce: '#0E5C50',
  slate: '#4A5A86',
  brick: '#A8321F',
};

/** A4 by default; what is drawn stays inside an area that US Letter also holds. */
export const area = { left: 44, right: 551, top: 44, bottom: 742 };

/** Opens a sheet of paper. */
export function openSheet(title: string): Sheet {
  return new PDFDocument({
    size: 'A4',
    margins: {
      left: area.left,
      right: 595 - area.right,
      top: area.top,
      bottom: 842 - area.bottom - 30,
    },
    bufferPages: true,
    lang: 'en',
    displayTitle: true,
    info: { Title: title, Author: 'Tockwell' },
  });
}

export interface TextStyle {
  size: number;
  weight?: Weight;
  colour?: string;
  width?: number;
  align?: 'left' | 'center' | 'right';
  lineGap?: number;
}

/** Width of a text on one line, in points. */
export function textWidth(sheet: Sheet, text: string, { size, weight = 400 }: TextStyle): number {
  return fontRuns(text).reduce((sum, run) => {
    sheet.font(fontFile(run.subset, weight)).fontSize(size);
    return sum + sheet.widthOfString(run.text);
  }, 0);
}

/** Writes text from a point, wrapping within `width`; returns the y below it. */
export function write(sheet: Sheet, text: string, x: number, y: number, style: TextStyle): number {
  const { size, weight = 400, colour = ink.text, width = area.right - x, lineGap = 2 } = style;
  sheet.fillColor(colour).fontSize(size);
  const runs = fontRuns(text);
  if (style.align === 'right' || style.align === 'center') {
    const whole = textWidth(sheet, text, style);
    const start = style.align === 'right' ? x + width - whole : x + (width - whole) / 2;
    return write(sheet, text, start, y, { ...style, align: 'left', width: whole + 4 });
  }
  runs.forEach((run, k) => {
    const options = { width, lineGap, continued: k < runs.length - 1 };
    sheet.font(fontFile(run.subset, weight)).fontSize(size);
    if (k === 0) sheet.text(run.text, x, y, options);
    else sheet.text(run.text, options);
  });
  return sheet.y;
}

/** A thin rule across the sheet. */
export function rule(sheet: Sheet, y: number, from = area.left, to = area.right): void {
  sheet.moveTo(from, y).lineTo(to, y).lineWidth(0.6).strokeColor(ink.line).stroke();
}

/** Ends the sheet and gathers its bytes. */
export function finish(sheet: Sheet): Promise<Buffer> {
  return new Promise((done, fail) => {
    const pieces: Buffer[] = [];
    sheet.on('data', (piece: Buffer) => pieces.push(piece));
    sheet.on('end', () => done(Buffer.concat(pieces)));
    sheet.on('error', fail);
    sheet.end();
  });
}
