import { ledColours } from '../contracts/brief.ts';
import type { Shop } from '../contracts/shop.ts';
import { partsOf } from '../domain/catalogue.ts';
import { currency } from '../domain/money.ts';
import { countWords } from '../domain/wording.ts';
import type { Deps } from '../ports.ts';
import { shopSettings } from '../store/settings.ts';

/** What the forms need to know of the shop before anybody types. */
export async function viewShop(
  deps: Pick<Deps, 'db' | 'stockView' | 'demo' | 'mailPageUrl'>,
): Promise<Shop> {
  const [settings, catalogue] = await Promise.all([
    shopSettings(deps.db),
    deps.stockView.current(),
  ]);
  const colours = new Set<string>(partsOf(catalogue, 'led').map((part) => part.facts.colour));
  return {
    name: settings.name,
    address: settings.address,
    email: settings.email,
    currency,
    demo: deps.demo,
    mailPageUrl: deps.mailPageUrl,
    batteries: partsOf(catalogue, 'battery').map(({ facts }) => ({
      sku: facts.sku,
      label: facts.name,
      words: `${countWords(facts.cells)} ${facts.cellSize} cells`,
      nominalVolts: facts.nominalVolts,
    })),
    ledColours: ledColours.filter((colour) => colours.has(colour)),
    carriers: settings.carriers,
  };
}
