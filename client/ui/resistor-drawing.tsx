import { bandColours } from './band-colours.ts';

const body =
  'M21 6C25 3 33 3 37 6C40 8 43 8 47 8H73C77 8 80 8 83 6C87 3 95 3 99 6C103 9 103 23 99 26C95 29 87 29 83 26C80 24 77 24 73 24H47C43 24 40 24 37 26C33 29 25 29 21 26C17 23 17 9 21 6Z';

/** Where each band sits: the first on the left bulge, the tolerance band set apart on the right one. */
function bandPlaces(count: number): number[] {
  if (count <= 4) return [27, 44, 56, 92].slice(0, count);
  if (count === 5) return [26, 42, 52, 62, 91];
  return [25, 41, 50, 59, 68, 91];
}

function ThroughHole({ bands }: { bands: readonly string[] }) {
  const places = bandPlaces(bands.length);
  const bulge = (x: number) => x < 36 || x > 84;
  return (
    <svg aria-hidden="true" viewBox="0 0 120 32" className="h-8 w-30 max-w-full">
      <path d="M0 16H120" stroke="#8b9294" strokeWidth="2.5" />
      <path d={body} fill={bands.length <= 4 ? '#e4d2ab' : '#bfd9e2'} />
      {bands.map((band, index) => {
        const x = places[index] ?? 92;
        const top = bulge(x) ? 4.6 : 8;
        return (
          <rect
            key={index}
            x={x - 3}
            y={top}
            width="6"
            height={32 - 2 * top}
            fill={bandColours[band] ?? '#999'}
          />
        );
      })}
      <path d={body} fill="none" stroke="#3c4a4e" strokeWidth="1.25" />
      <path
        d="M23 9C28 6.5 31 6.5 35 8.6"
        fill="none"
        stroke="#fff"
        strokeOpacity=".6"
        strokeWidth="1.5"
      />
    </svg>
  );
}

function SurfaceMount({ code }: { code: string }) {
  return (
    <svg aria-hidden="true" viewBox="0 0 64 32" className="h-8 w-16">
      <rect x="4" y="4" width="56" height="24" rx="2" fill="#b7bcbd" stroke="#3c4a4e" />
      <rect x="13" y="4" width="38" height="24" fill="#23292b" />
      <text x="32" y="21.5" textAnchor="middle" fontSize="14" fontWeight="600" fill="#f3efe4">
        {code}
      </text>
    </svg>
  );
}

/** A resistor with its bands to IEC 60062, or the chip with its printed code. */
export function ResistorDrawing(props: {
  bands: readonly string[] | null;
  code: string | null;
  surfaceMount: boolean;
}) {
  if (props.surfaceMount || props.bands === null) return <SurfaceMount code={props.code ?? ''} />;
  return <ThroughHole bands={props.bands} />;
}
