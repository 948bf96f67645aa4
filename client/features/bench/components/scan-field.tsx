import { clsx } from 'clsx';
import { useId, useState } from 'react';
import { useAlwaysFocused } from '../use-always-focused.ts';
import { WrongSign } from './wrong-sign.tsx';

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
