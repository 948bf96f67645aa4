import type { PackPart } from '../../server/contracts/packs.ts';
import { CapacitorDrawing } from './capacitor-drawing.tsx';
import {
  BatteryDrawing,
  BoardDrawing,
  ChipDrawing,
  DiodeDrawing,
  HolderDrawing,
  LedDrawing,
  TrimmerDrawing,
} from './component-drawings.tsx';
import { ResistorDrawing } from './resistor-drawing.tsx';

export type DrawablePart = Pick<PackPart, 'kind' | 'marking'> &
  Partial<Pick<PackPart, 'mounting' | 'dielectric' | 'colour'>>;

/** The part as it looks in the hand; always beside its name, never instead of it. */
export function PartDrawing({ part }: { part: DrawablePart }) {
  const surfaceMount = part.mounting === 'surface-mount';
  const { bands, code } = part.marking;
  switch (part.kind) {
    case 'resistor':
      return <ResistorDrawing bands={bands} code={code} surfaceMount={surfaceMount} />;
    case 'capacitor':
      return (
        <CapacitorDrawing dielectric={part.dielectric} code={code} surfaceMount={surfaceMount} />
      );
    case 'comparator':
      return <ChipDrawing code={code ?? ''} />;
    case 'led':
      return <LedDrawing colour={part.colour ?? ''} />;
    case 'board':
      return <BoardDrawing />;
    case 'battery':
      return <BatteryDrawing />;
    case 'holder':
      return <HolderDrawing />;
    case 'trimmer':
      return <TrimmerDrawing />;
    case 'diode':
      return <DiodeDrawing />;
  }
}
