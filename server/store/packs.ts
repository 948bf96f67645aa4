import type { Caution, PackPart, PackPromise, Topology } from '../contracts/packs.ts';
import type { PulseStripData } from '../contracts/drawing.ts';
import type { ResolvedBrief } from '../contracts/brief.ts';
import type { Circuit } from '../engine/circuit.ts';
import type { Database } from './connection.ts';

/** A pack as it was sold: never changed afterwards, whatever happens to stock and prices. */
export interface FrozenPack {
  identifier: string;
  token: string;
  topology: Topology;
  sentence: string;
  brief: ResolvedBrief;
  parts: PackPart[];
  promise: PackPromise;
  cautions: Caution[];
  strip: PulseStripData;
  circuit: Circuit;
}

/** Freezes a pack and returns its id. */
export async function freezePack(db: Database, pack: FrozenPack): Promise<string> {
  const [row] = await db('packs')
    .insert({
      identifier: pack.identifier,
      token: pack.token,
      topology: pack.topology,
      sentence: pack.sentence,
      brief: JSON.stringify(pack.brief),
      parts: JSON.stringify(pack.parts),
      promise: JSON.stringify(pack.promise),
      cautions: JSON.stringify(pack.cautions),
      strip: JSON.stringify(pack.strip),
      circuit: JSON.stringify(pack.circuit),
    })
    .returning('id');
  return row.id;
}
