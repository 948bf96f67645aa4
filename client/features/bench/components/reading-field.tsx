import { clsx } from 'clsx';
import { useId, useState } from 'react';
import { Button } from '../../../ui/button.tsx';
import { useAlwaysFocused } from '../use-always-focused.ts';
import { WrongSign } from './wrong-sign.tsx';

/** Takes what the meter shows, typed, pasted or sent by the meter itself, in large figures. */
export function ReadingField(props: {
  label: string;
  hint: string;
  error: string | null;
  busy: boolean;
  onReading: (text: string) => void;
}) {
  const id = useId();
  const field = useAlwaysFocused();
  const [text, setText] = useState('');
  const hasError = props.error !== null;
  return (
    <form
      className="mt-5"
      onSubmit={(event) => {
        event.preventDefault();
        if (text.trim() !== '' && !props.busy) props.onReading(text);
      }}
    >
      <div
        className={clsx(
          'rounded-control border-[3px] bg-card px-4 py-2',
          hasError ? 'border-brick' : 'border-soft focus-within:border-spruce',
        )}
      >
        <label htmlFor={id} className="block text-lead text-soft">
          {props.label}
        </label>
        <input
          ref={field}
          id={id}
          value={text}
          onChange={(event) => setText(event.target.value)}
          autoComplete="off"
          autoCapitalize="off"
          spellCheck={false}
          aria-invalid={hasError || undefined}
          aria-describedby={clsx(`${id}-hint`, hasError && `${id}-wrong`)}
          className="h-20 w-full bg-transparent text-grand font-heavy text-ink outline-none"
        />
      </div>
      <p id={`${id}-hint`} className="mt-2 text-soft">
        {props.hint}
      </p>
      {hasError && (
        <p id={`${id}-wrong`} role="alert" className="mt-2 flex gap-2 text-lead text-brick">
          <WrongSign />
          <span>{props.error}</span>
        </p>
      )}
      <Button
        type="submit"
        size="bench"
        className="mt-5 min-h-20 text-title max-sm:w-full sm:min-w-88"
        busy={props.busy}
        busyWords="Finding its R4"
      >
        Find its R4
      </Button>
    </form>
  );
}
