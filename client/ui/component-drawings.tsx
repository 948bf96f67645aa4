import { ledPaints } from './band-colours.ts';

export function ChipDrawing({ code }: { code: string }) {
  return (
    <svg aria-hidden="true" viewBox="0 0 64 40" className="h-10 w-16">
      {[13, 25.5, 38, 50.5].map((x) => (
        <path key={x} d={`M${x} 2V38`} stroke="#a7adae" strokeWidth="5" />
      ))}
      <rect x="5" y="7" width="54" height="26" rx="2" fill="#23292b" stroke="#5a686c" />
      <path d="M5 15a5 5 0 0 1 0 10Z" fill="#4a5558" />
      <circle cx="11.5" cy="28.5" r="1.75" fill="#7d898b" />
      <text x="34" y="23.5" textAnchor="middle" fontSize="9.5" fontWeight="600" fill="#e8e3d6">
        {code.slice(0, 8)}
      </text>
    </svg>
  );
}

export function LedDrawing({ colour }: { colour: string }) {
  return (
    <svg aria-hidden="true" viewBox="0 0 64 40" className="h-10 w-16">
      <path d="M26 26V40M38 26V36" stroke="#8b9294" strokeWidth="2.5" />
      <path
        d="M21 26V14C21 7.5 26 3 32 3C38 3 43 7.5 43 14V26Z"
        fill={ledPaints[colour] ?? '#bbb'}
        stroke="#2d2622"
      />
      <rect
        x="18"
        y="23"
        width="28"
        height="5"
        rx="1.5"
        fill={ledPaints[colour] ?? '#bbb'}
        stroke="#2d2622"
      />
      <path
        d="M26 20V13C26 10 28 7.5 30.5 6.8"
        fill="none"
        stroke="#fff"
        strokeOpacity=".7"
        strokeWidth="2"
      />
    </svg>
  );
}

export function BoardDrawing() {
  return (
    <svg aria-hidden="true" viewBox="0 0 64 40" className="h-10 w-16">
      <rect x="4" y="4" width="56" height="32" rx="3" fill="#1f5a45" stroke="#0f2d22" />
      {[10, 54].map((x) =>
        [10, 30].map((y) => <circle key={`${x}${y}`} cx={x} cy={y} r="2.75" fill="#f1ead9" />),
      )}
      <path d="M17 14H28L33 20H46M17 26H25L30 20" fill="none" stroke="#8fc7a8" strokeWidth="1.75" />
      {[17, 24, 40, 46].map((x) => (
        <circle key={x} cx={x} cy={x < 30 ? 14 : 28} r="1.75" fill="#d8b65a" />
      ))}
    </svg>
  );
}

export function BatteryDrawing() {
  return (
    <svg aria-hidden="true" viewBox="0 0 64 40" className="h-10 w-16">
      {[3, 22].map((y) => (
        <g key={y}>
          <rect x="57" y={y + 4.5} width="4" height="6" rx="1" fill="#a7adae" />
          <rect x="4" y={y} width="53" height="15" rx="2.5" fill="#37474b" stroke="#66747a" />
          <rect x="42" y={y} width="15" height="15" rx="2.5" fill="#b5793a" />
          <path d={`M49.5 ${y + 4.5}v6M46.5 ${y + 7.5}h6`} stroke="#fff" strokeWidth="1.5" />
        </g>
      ))}
    </svg>
  );
}

export function HolderDrawing() {
  return (
    <svg aria-hidden="true" viewBox="0 0 64 40" className="h-10 w-16">
      <path d="M50 6H62M50 34H62" stroke="#a8321f" strokeWidth="2.5" />
      <path d="M50 34H62" stroke="#1d1d1b" strokeWidth="2.5" />
      <rect x="3" y="3" width="50" height="34" rx="3" fill="#2a3236" stroke="#5a686c" />
      <path d="M3 20H53M9 9V14M9 26V31" stroke="#66747a" strokeWidth="2" />
      <path d="M44 11.5H48M46 9.5V13.5" stroke="#d8d2c4" strokeWidth="1.5" />
    </svg>
  );
}

export function TrimmerDrawing() {
  return (
    <svg aria-hidden="true" viewBox="0 0 64 40" className="h-10 w-16">
      <path d="M22 32V40M32 32V40M42 32V40" stroke="#8b9294" strokeWidth="2.5" />
      <rect x="15" y="3" width="34" height="30" rx="2" fill="#2459a9" stroke="#12305e" />
      <circle cx="32" cy="18" r="9" fill="#e8e3d6" stroke="#12305e" />
      <path d="M26 18H38" stroke="#12305e" strokeWidth="2.5" />
    </svg>
  );
}

export function DiodeDrawing() {
  return (
    <svg aria-hidden="true" viewBox="0 0 64 40" className="h-10 w-16">
      <path d="M0 20H64" stroke="#8b9294" strokeWidth="2.5" />
      <rect x="18" y="12" width="28" height="16" rx="4" fill="#b4562f" stroke="#3c2a26" />
      <rect x="38" y="12" width="5" height="16" fill="#1d1d1b" />
    </svg>
  );
}
