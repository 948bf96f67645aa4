import { Minus, Plus } from 'lucide-react';
import { useState } from 'react';

export interface StepperProps {
  label: string;
  value: number;
  min: number;
  max: number;
  onCommit: (value: number) => void;
  disabled?: boolean;
}

const stepClass =
  'grid size-11 place-items-center text-spruce hover:bg-wash disabled:text-line disabled:hover:bg-transparent';

/** A whole number with a step either way; a typed number counts when the field is left or Enter pressed. */
export function Stepper({ label, value, min, max, onCommit, disabled }: StepperProps) {
  const [typed, setTyped] = useState<string | null>(null);
  const commit = (next: number) => {
    setTyped(null);
    const bounded = Math.max(min, Math.min(max, Math.round(next)));
    if (Number.isFinite(bounded) && bounded !== value) onCommit(bounded);
  };
  return (
    <div className="inline-flex overflow-hidden rounded-control border-[1.5px] border-soft bg-card">
      <button
        type="button"
        aria-label={`${label}: one fewer`}
        className={stepClass}
        disabled={disabled === true || value <= min}
        onClick={() => commit(value - 1)}
      >
        <Minus aria-hidden="true" className="size-4" />
      </button>
      <input
        aria-label={label}
        inputMode="numeric"
        className="w-14 bg-transparent text-center font-heavy"
        value={typed ?? String(value)}
        disabled={disabled}
        onChange={(event) => setTyped(event.target.value)}
        onBlur={() => commit(Number(typed ?? value))}
        onKeyDown={(event) => {
          if (event.key === 'Enter') commit(Number(typed ?? value));
        }}
      />
      <button
        type="button"
        aria-label={`${label}: one more`}
        className={stepClass}
        disabled={disabled === true || value >= max}
        onClick={() => commit(value + 1)}
      >
        <Plus aria-hidden="true" className="size-4" />
      </button>
    </div>
  );
}
