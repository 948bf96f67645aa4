import { clsx } from 'clsx';
import type { CSSProperties } from 'react';
import type { Drawing, DrawingItem } from '../../server/contracts/drawing.ts';
import { bindUnits } from '../lib/spaces.ts';
import { useOverflow } from '../lib/use-overflow.ts';
import { viewBoxOf } from './schematic-bounds.ts';
import { ComparatorSymbol, PartSymbol } from './schematic-symbols.tsx';

export interface SchematicProps {
  drawing: Drawing;
  /** Roles lit now; hovering or pressing a part asks to light it. */
  lit?: ReadonlySet<string>;
  onLight?: (role: string | null) => void;
  onPress?: (role: string) => void;
  label: string;
}

type Point = readonly [number, number];

function polyline(points: readonly Point[]): string {
  return points.map(([x, y], index) => `${index === 0 ? 'M' : 'L'}${x} ${y}`).join('');
}

function Item({ item, lit }: { item: DrawingItem; lit: boolean }) {
  switch (item.kind) {
    case 'wire':
      return <path d={polyline(item.points)} />;
    case 'dot':
      return (
        <circle
          cx={item.at[0]}
          cy={item.at[1]}
          r={4}
          className={lit ? 'fill-spruce' : 'fill-ink'}
        />
      );
    case 'part':
      return <PartSymbol symbol={item.symbol} from={item.from} to={item.to} />;
    case 'comparator':
      return <ComparatorSymbol {...item} />;
    case 'ground': {
      const [x, y] = item.at;
      return (
        <path
          d={`M${x} ${y}v${6}M${x - 13} ${y + 6}h${26}M${x - 8} ${y + 11}h${16}M${x - 3.5} ${y + 16}h${7}`}
        />
      );
    }
    case 'label':
      return <Label item={item} lit={lit} />;
  }
}

function Label(props: { item: DrawingItem & { kind: 'label' }; lit: boolean }) {
  const { item } = props;
  return (
    <text
      x={item.at[0]}
      y={item.at[1]}
      textAnchor={item.anchor}
      fontSize={15}
      strokeWidth={5}
      paintOrder="stroke"
      className={clsx(
        'stroke-card',
        item.weight === 'strong' ? 'font-heavy' : 'font-strong',
        props.lit ? 'fill-spruce' : item.weight === 'strong' ? 'fill-ink' : 'fill-soft',
      )}
    >
      {bindUnits(item.text)}
    </text>
  );
}

/** The halo behind a lit part, and the wide invisible line that is easy to hit. */
function Reach({ item, lit }: { item: DrawingItem; lit: boolean }) {
  if (item.kind === 'comparator') {
    const [x, y] = item.at;
    return (
      <path
        d={`M${x} ${y - item.height / 2}V${y + item.height / 2}L${x + item.width} ${y}Z`}
        strokeWidth={18}
        className={clsx('fill-transparent', lit ? 'stroke-wash' : 'stroke-transparent')}
      />
    );
  }
  if (item.kind !== 'part') return null;
  return (
    <path
      d={polyline([item.from, item.to])}
      strokeWidth={30}
      strokeLinecap="round"
      className={lit ? 'stroke-wash' : 'stroke-transparent'}
    />
  );
}

/** On a phone, with fewer pixels for each unit, the lettering would be too small; it scrolls instead. */
const leastScale = 0.72;

/** The circuit as a line drawing; what is lit here is lit in the list beside it too. */
export function Schematic({ drawing, lit, onLight, onPress, label }: SchematicProps) {
  const [box, scrolls] = useOverflow<HTMLDivElement>();
  return (
    <>
      <div
        ref={box}
        className="overflow-x-auto"
        {...(scrolls ? { role: 'region', 'aria-label': 'Circuit diagram', tabIndex: 0 } : {})}
      >
        <svg
          role="img"
          aria-label={label}
          viewBox={viewBoxOf(drawing)}
          className="block w-full max-sm:min-w-(--least) print:min-w-0!"
          style={{ '--least': `${drawing.width * leastScale}px` } as CSSProperties}
          fill="none"
          strokeWidth={2}
          strokeLinejoin="round"
          strokeLinecap="round"
        >
          {drawing.items.map((item, index) => (
            <Piece key={index} item={item} lit={lit} onLight={onLight} onPress={onPress} />
          ))}
        </svg>
      </div>
      {scrolls && (
        <p className="mt-2 w-fit bg-card pr-1 text-small text-soft">
          The drawing goes on to the right; slide it.
        </p>
      )}
    </>
  );
}

function Piece(props: { item: DrawingItem } & Pick<SchematicProps, 'lit' | 'onLight' | 'onPress'>) {
  const { item, lit, onLight, onPress } = props;
  const role = 'role' in item ? item.role : undefined;
  const isLit = role !== undefined && lit?.has(role) === true;
  const touch =
    role === undefined
      ? {}
      : {
          onPointerEnter: () => onLight?.(role),
          onPointerLeave: () => onLight?.(null),
          onClick: () => onPress?.(role),
        };
  return (
    <g
      className={clsx('transition-colors duration-150', isLit ? 'stroke-spruce' : 'stroke-ink')}
      {...touch}
    >
      <Reach item={item} lit={isLit} />
      <g strokeWidth={isLit ? 3 : undefined}>
        <Item item={item} lit={isLit} />
      </g>
    </g>
  );
}
