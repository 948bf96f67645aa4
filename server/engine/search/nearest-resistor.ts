import { firstNotBelow, type ResistorValues } from './resistor-values.ts';
import type { StockedResistor } from './shelf.ts';

/**
 * The resistor nearest to `idealOhms` by ratio among those that pass, or null. Ties within 1e-12 go to
 * the lower price, then to the lower id.
 */
export function nearestResistor(
  { ohms, parts }: Pick<ResistorValues, 'ohms' | 'parts'>,
  idealOhms: number,
  passes: (part: StockedResistor) => boolean,
): StockedResistor | null {
  const start = firstNotBelow(ohms, idealOhms);
  const first = (from: number, step: number): StockedResistor | null => {
    for (let k = from; k >= 0 && k < ohms.length; k += step) {
      const part = parts[k]!.find(passes);
      if (part) return part;
    }
    return null;
  };
  const below = first(start - 1, -1);
  const above = first(start, 1);
  if (below === null || above === null) return below ?? above;
  const nearer = Math.log(above.ohms / idealOhms) - Math.log(idealOhms / below.ohms);
  if (Math.abs(nearer) > 1e-12) return nearer > 0 ? below : above;
  return (below.priceMinor - above.priceMinor || below.id - above.id) < 0 ? below : above;
}
