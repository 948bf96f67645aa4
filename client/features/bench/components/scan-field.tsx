import { clsx } from 'clsx';
import { useEffect, useId, useRef, useState } from 'react';
import type { RefObject } from 'react';

/** A key that a scanner sends, wherever the focus is, belongs into the field. */
function isForTheField(event: KeyboardEvent): boolean {
  if (event.ctrlKey || event.metaKey || event.altKey || event.isComposing) return false;
  if (!/^[a-z0-9-]$/i.test(event.key)) return false;
  const { target } = event;
  return !(target instanceof HTMLElement) || target.closest('input, textarea, select') === null;
}

function useAlwaysFocused(): RefObject<HTMLInputElement | null> {
  const field = useRef<HTMLInputElement>(null);
  useEffect(() => {
    // After the frame: a page that was just arrived at gives the focus to its main part first.
    const frame = requestAnimationFrame(() => field.current?.focus({ preventScroll: true }));
    const catchKey = (event: KeyboardEvent) => {
      if (isForTheField(event)) field.current?.focus({ preventScroll: true });
    };
    document.addEventListener('keydown', catchKey);
    return () => {
      cancelAnimationFrame(frame);
      document.removeEventListener('keydown', catchKey);
    };
  }, []);
  return field;
}

/** A code that was not taken: another part's, or one that does not say enough. */
export interface Refused {
  kind: 'wrong' | 'unclear';
  sentence: string;
}

/** Takes the scanner's word. It asks for no keyboard on the glass until somebody wants to type. */
export function ScanField(props: {
  label: string;
  wrong: Refused | null;
  onCode: (text: string) => void;
}) {
  const id = useId();
  const field = useAlwaysFocused();
  const [text, setText] = useState('');
  const [typing, setTyping] = useState(false);
  const hasError = props.wrong !== null;
  return (
    <form
      className={clsx(
        'mt-5 rounded-control border-[3px] bg-card px-4 py-2',
        hasError ? 'border-brick' : 'border-line focus-within:border-spruce',
      )}
      onSubmit={(event) => {
        event.preventDefault();
        props.onCode(text);
        setText('');
      }}
    >
      <div className="flex items-center gap-4">
        <div className="min-w-0 flex-1">
          <label htmlFor={id} className="block text-small text-soft">
            {props.label}
          </label>
          <input
            ref={field}
            id={id}
            value={text}
            onChange={(event) => setText(event.target.value)}
            inputMode={typing ? 'text' : 'none'}
            autoComplete="off"
            autoCapitalize="characters"
            spellCheck={false}
            aria-invalid={hasError || undefined}
            aria-describedby={hasError ? `${id}-wrong` : undefined}
            className="h-9 w-full bg-transparent text-title font-heavy text-ink outline-none"
          />
        </div>
        <button
          type="button"
          aria-pressed={typing}
          className="min-h-14 rounded-control px-3 font-strong text-spruce underline decoration-2 underline-offset-4 hover:bg-wash [@media(pointer:fine)]:hidden"
          onClick={() => {
            setTyping(!typing);
            field.current?.blur();
            requestAnimationFrame(() => field.current?.focus());
          }}
        >
          Type it
        </button>
      </div>
      {hasError && (
        <p id={`${id}-wrong`} role="alert" className="mt-1 flex gap-2 text-lead text-brick">
          <WrongSign />
          <span>
            {props.wrong?.kind === 'wrong' && <strong className="font-heavy">Wrong one. </strong>}
            {props.wrong?.sentence}
          </span>
        </p>
      )}
    </form>
  );
}

function WrongSign() {
  return (
    <svg aria-hidden="true" viewBox="0 0 20 20" className="mt-1 size-5 shrink-0">
      <path
        d="M3 3L17 17M17 3L3 17"
        className="stroke-brick"
        strokeWidth="4"
        strokeLinecap="round"
      />
    </svg>
  );
}
