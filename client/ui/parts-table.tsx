import { clsx } from 'clsx';
import type { PackPart } from '../../server/contracts/packs.ts';
import { bindUnits } from '../lib/spaces.ts';
import { BandNames } from './band-names.tsx';
import { PartDrawing } from './part-drawing.tsx';
import { groupParts, rolesText } from './part-groups.ts';
import type { PartGroup } from './part-groups.ts';

export interface PartsTableProps {
  parts: readonly PackPart[];
  lit?: ReadonlySet<string>;
  onLight?: (roles: readonly string[]) => void;
  caption: string;
}

/** The parts by code, each drawn and its marking in words; a row lights with its part in the drawing. */
export function PartsTable({ parts, lit, onLight, caption }: PartsTableProps) {
  return (
    <table className="w-full border-collapse text-left">
      <caption className="sr-only">{caption}</caption>
      <thead className="sr-only sm:not-sr-only">
        <tr className="border-b-2 border-ink text-small text-soft">
          <th className="py-1.5 font-strong">Code</th>
          <th className="py-1.5 font-strong">Part and how it is marked</th>
          <th className="py-1.5 text-right font-strong">Pieces</th>
        </tr>
      </thead>
      <tbody>
        {groupParts(parts).map((group) => {
          const isLit = group.roles.some((role) => lit?.has(role) === true);
          return (
            <tr
              key={group.key}
              className={clsx('ledger-line transition-colors duration-150', isLit && 'bg-wash')}
              onPointerEnter={() => onLight?.(group.roles)}
              onPointerLeave={() => onLight?.([])}
            >
              <th scope="row" className="w-16 py-2 pr-2 pl-1 align-top font-heavy">
                <RoleButton group={group} isLit={isLit} onLight={onLight} />
              </th>
              <td className="py-2 align-top">
                <PartCell part={group.part} />
              </td>
              <td className="w-12 py-2 pr-1 text-right align-top font-heavy">{group.quantity}</td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}

function RoleButton(props: {
  group: PartGroup;
  isLit: boolean;
  onLight: PartsTableProps['onLight'];
}) {
  const { group, isLit, onLight } = props;
  const words = rolesText(group.roles);
  if (onLight === undefined) return <span>{words}</span>;
  return (
    <button
      type="button"
      aria-label={`${words}: show in the drawing`}
      aria-pressed={isLit}
      onFocus={() => onLight(group.roles)}
      onBlur={() => onLight([])}
      onClick={() => onLight(group.roles)}
      className="min-h-6 text-left font-heavy whitespace-nowrap text-spruce underline decoration-dotted decoration-2 underline-offset-4"
    >
      {words}
    </button>
  );
}

function PartCell({ part }: { part: PackPart }) {
  return (
    <div className="flex flex-wrap items-center gap-x-4 gap-y-1">
      <span className="flex w-30 shrink-0 justify-center">
        <PartDrawing part={part} />
      </span>
      <span className="min-w-[10rem] flex-1">
        <span className="block font-strong">{bindUnits(part.label)}</span>
        <span className="block text-small text-soft">
          <BandNames marking={part.marking} />
        </span>
      </span>
    </div>
  );
}
