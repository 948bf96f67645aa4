import type { Printer } from '../../ports.ts';
import { printBuildSheet } from './build-sheet-pdf.ts';

/** Puts documents on paper with pdfkit and the shop's own fonts. */
export function createPrinter(): Printer {
  return { buildSheet: printBuildSheet };
}
