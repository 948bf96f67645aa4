import { clsx } from 'clsx';
import { useId } from 'react';
import type { InputHTMLAttributes, ReactNode, Ref, SelectHTMLAttributes } from 'react';

interface FrameProps {
  label: ReactNode;
  hint?: ReactNode;
  error?: string;
  className?: string;
}

function describedBy(id: string, props: FrameProps): string | undefined {
  const ids = [
    props.hint === undefined ? null : `${id}-hint`,
    props.error === undefined ? null : `${id}-error`,
  ].filter((each) => each !== null);
  return ids.length === 0 ? undefined : ids.join(' ');
}

function FieldFrame({ id, children, ...props }: FrameProps & { id: string; children: ReactNode }) {
  return (
    <div className={clsx('flex flex-col gap-1', props.className)}>
      <label htmlFor={id} className="font-strong">
        {props.label}
      </label>
      {children}
      {props.hint !== undefined && (
        <p id={`${id}-hint`} className="text-small text-soft">
          {props.hint}
        </p>
      )}
      {props.error !== undefined && (
        <p id={`${id}-error`} className="text-small font-strong text-brick">
          {props.error}
        </p>
      )}
    </div>
  );
}

export type FieldProps = FrameProps &
  Omit<InputHTMLAttributes<HTMLInputElement>, 'className'> & {
    /** Unit set inside the control's right edge. */
    unit?: string;
    ref?: Ref<HTMLInputElement>;
  };

/** A labelled text control with its hint and its error beside it. */
export function Field({ label, hint, error, className, unit, ...input }: FieldProps) {
  const ownId = useId();
  const id = input.id ?? ownId;
  const frame = { label, hint, error, className };
  return (
    <FieldFrame id={id} {...frame}>
      <span className="relative block">
        <input
          {...input}
          id={id}
          className={clsx('control', unit !== undefined && 'pr-14')}
          aria-invalid={error !== undefined || undefined}
          aria-describedby={describedBy(id, frame)}
        />
        {unit !== undefined && (
          <span
            aria-hidden="true"
            className="pointer-events-none absolute inset-y-0 right-3 flex items-center text-soft"
          >
            {unit}
          </span>
        )}
      </span>
    </FieldFrame>
  );
}

export type SelectProps = FrameProps &
  Omit<SelectHTMLAttributes<HTMLSelectElement>, 'className'> & {
    options: readonly { value: string; label: string; disabled?: boolean }[];
    ref?: Ref<HTMLSelectElement>;
  };

export function Select({ label, hint, error, className, options, ...select }: SelectProps) {
  const ownId = useId();
  const id = select.id ?? ownId;
  const frame = { label, hint, error, className };
  return (
    <FieldFrame id={id} {...frame}>
      <select
        {...select}
        id={id}
        className="control"
        aria-invalid={error !== undefined || undefined}
        aria-describedby={describedBy(id, frame)}
      >
        {options.map((option) => (
          <option key={option.value} value={option.value} disabled={option.disabled}>
            {option.label}
          </option>
        ))}
      </select>
    </FieldFrame>
  );
}

export type CheckProps = Omit<InputHTMLAttributes<HTMLInputElement>, 'className' | 'type'> & {
  label: ReactNode;
  error?: string;
  ref?: Ref<HTMLInputElement>;
};

/** A tick box whose whole line can be pressed. */
export function Check({ label, error, ...input }: CheckProps) {
  const id = useId();
  return (
    <div>
      <label className="flex min-h-11 items-start gap-3 py-2">
        <input
          {...input}
          type="checkbox"
          className="mt-0.5 size-6 shrink-0"
          aria-invalid={error !== undefined || undefined}
          aria-describedby={error === undefined ? undefined : id}
        />
        <span>{label}</span>
      </label>
      {error !== undefined && (
        <p id={id} className="pl-9 text-small font-strong text-brick">
          {error}
        </p>
      )}
    </div>
  );
}
