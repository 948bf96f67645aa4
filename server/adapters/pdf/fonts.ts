import { existsSync } from 'node:fs';
import { createRequire } from 'node:module';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

export type Weight = 400 | 600 | 800;
type Subset = 'latin' | 'latin-ext' | 'signs';

const resolve = createRequire(import.meta.url).resolve;

/** The folder that holds package.json, from the sources and from the bundle alike. */
function projectFolder(): string {
  let folder = path.dirname(fileURLToPath(import.meta.url));
  while (!existsSync(path.join(folder, 'package.json'))) {
    const parent = path.dirname(folder);
    if (parent === folder) throw new Error('The project folder with its fonts was not found.');
    folder = parent;
  }
  return folder;
}

/** File of one subset of Nunito; the shop's own signs file has Ω and →. */
export function fontFile(subset: Subset, weight: Weight): string {
  if (subset === 'signs') {
    return path.join(projectFolder(), `client/styles/fonts/tockwell-signs-${weight}.woff`);
  }
  return resolve(`@fontsource/nunito/files/nunito-${subset}-${weight}-normal.woff`);
}

const signs = /[\u03a9\u2126\u2192]/;
const beyondLatin = /[\u0100-\u0130\u0132-\u0151\u0154-\u024f\u1e00-\u1eff]/;

function subsetOf(character: string): Subset {
  if (signs.test(character)) return 'signs';
  return beyondLatin.test(character) ? 'latin-ext' : 'latin';
}

/** The font library cannot measure an empty glyph, so on paper the wider no-break space stands in. */
const onPaper = (text: string) =>
  text.replaceAll('\u202f', '\u00a0').replaceAll('\u03bc', '\u00b5');

/** Splits a text into runs that one font file can draw. */
export function fontRuns(text: string): { subset: Subset; text: string }[] {
  const runs: { subset: Subset; text: string }[] = [];
  for (const character of onPaper(text)) {
    const subset = subsetOf(character);
    const last = runs[runs.length - 1];
    if (last?.subset === subset) last.text += character;
    else runs.push({ subset, text: character });
  }
  return runs;
}
