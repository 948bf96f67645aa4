/** No-break space: words and numbers that must stay on one line. */
export const noBreak = '\u00a0';
/** Narrow no-break space: between a value and its unit. */
export const narrow = '\u202f';
export const minus = '\u2212';

/** Keeps what belongs together on one line: "± 5 %", "3 V", "two AA cells" stay whole. */
export function keepTogether(text: string): string {
  return text.replaceAll(' ', noBreak);
}

/** A sentence that goes on inside another one starts small. */
export function insideSentence(text: string): string {
  return /^[A-Z][a-z ]/.test(text) ? text.charAt(0).toLowerCase() + text.slice(1) : text;
}

/** In running text: binds ± to its number, and a number to the unit after it. */
export function bindUnits(text: string): string {
  return text
    .replace(/([±−+]) (?=\d)/g, `$1${narrow}`)
    .replace(/(\d) (?=(?:%|°C|[kMGmµnp]?(?:Hz|V|A|F|Ω|s|h)\b|kΩ|MΩ|Ω))/g, `$1${narrow}`);
}
