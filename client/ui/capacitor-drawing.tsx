interface CapacitorProps {
  dielectric: string | undefined;
  code: string | null;
  surfaceMount: boolean;
}

function Printed({ code, y, fill = '#fff' }: { code: string; y: number; fill?: string }) {
  const size = code.length > 5 ? 8.5 : code.length > 4 ? 10 : 12;
  return (
    <text x="32" y={y} textAnchor="middle" fontSize={size} fontWeight="800" fill={fill}>
      {code}
    </text>
  );
}

function Film({ code }: { code: string }) {
  return (
    <>
      <path d="M20 30V40M44 30V40" stroke="#8b9294" strokeWidth="2.5" />
      <rect x="6" y="3" width="52" height="28" rx="4" fill="#a8432f" stroke="#3c2a26" />
      <path d="M10 6.5H54" stroke="#fff" strokeOpacity=".35" strokeWidth="1.5" />
      <Printed code={code} y={21.5} />
    </>
  );
}

function Ceramic({ code }: { code: string }) {
  return (
    <>
      <path d="M24 28L22 40M40 28L42 40" stroke="#8b9294" strokeWidth="2.5" fill="none" />
      <path
        d="M32 2C44 2 50 9 50 17C50 25 44 31 38 31C35 31 34 29.5 32 29.5C30 29.5 29 31 26 31C20 31 14 25 14 17C14 9 20 2 32 2Z"
        fill="#d9a35a"
        stroke="#5b4421"
      />
      <Printed code={code} y={20.5} fill="#2a1f0d" />
    </>
  );
}

function Electrolytic({ code }: { code: string }) {
  return (
    <>
      <path d="M24 32V40M40 32V37" stroke="#8b9294" strokeWidth="2.5" />
      <rect x="12" y="2" width="40" height="30" rx="3" fill="#27343b" stroke="#66747a" />
      <rect x="41" y="2" width="11" height="30" fill="#c8ccc6" />
      <path d="M44 10H49M44 17H49M44 24H49" stroke="#27343b" strokeWidth="2" />
      <text x="26.5" y="20.5" textAnchor="middle" fontSize="9.5" fontWeight="800" fill="#f3efe4">
        {code}
      </text>
    </>
  );
}

function Chip() {
  return (
    <>
      <rect x="8" y="8" width="48" height="24" rx="2" fill="#b7bcbd" stroke="#3c4a4e" />
      <rect x="18" y="8" width="28" height="24" fill="#b98a55" />
    </>
  );
}

/** A capacitor as it comes out of the bag: film box, ceramic disc, electrolytic can or bare chip. */
export function CapacitorDrawing({ dielectric = '', code, surfaceMount }: CapacitorProps) {
  const mark = code ?? '';
  const shape = surfaceMount ? (
    <Chip />
  ) : dielectric.startsWith('film') ? (
    <Film code={mark} />
  ) : dielectric === 'electrolytic' ? (
    <Electrolytic code={mark} />
  ) : (
    <Ceramic code={mark} />
  );
  return (
    <svg aria-hidden="true" viewBox="0 0 64 40" className="h-10 w-16">
      {shape}
    </svg>
  );
}
