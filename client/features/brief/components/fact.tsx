import { clsx } from 'clsx';

interface FactProps {
  label: string;
  value: string;
  onChange: (value: string) => void;
  error?: string;
  errorId: string;
}

export interface FactOption {
  value: string;
  label: string;
  /** The words in the sentence where they differ from the words in the list. */
  shown?: string;
}

/** A part of the sentence that is chosen from a list: the words show, the list opens beneath them. */
export function FactChoice(props: FactProps & { options: readonly FactOption[] }) {
  const option = props.options.find((each) => each.value === props.value);
  return (
    <span className={clsx('fact', props.error !== undefined && 'fact-wrong')}>
      <span aria-hidden="true">{option?.shown ?? option?.label ?? props.value}</span>
      <select
        aria-label={props.label}
        aria-invalid={props.error !== undefined || undefined}
        aria-describedby={props.error === undefined ? undefined : props.errorId}
        value={props.value}
        onChange={(event) => props.onChange(event.target.value)}
      >
        {props.options.map((each) => (
          <option key={each.value} value={each.value}>
            {each.label}
          </option>
        ))}
      </select>
    </span>
  );
}

/** A part of the sentence that is typed: the field is as wide as what stands in it. */
export function FactNumber(props: FactProps) {
  return (
    <span className={clsx('fact fact-typed', props.error !== undefined && 'fact-wrong')}>
      <span aria-hidden="true" className="fact-size">
        {props.value === '' ? ' ' : props.value}
      </span>
      <input
        aria-label={props.label}
        aria-invalid={props.error !== undefined || undefined}
        aria-describedby={props.error === undefined ? undefined : props.errorId}
        inputMode="decimal"
        autoComplete="off"
        spellCheck={false}
        size={1}
        maxLength={14}
        value={props.value}
        onChange={(event) => props.onChange(event.target.value)}
        onFocus={(event) => event.target.select()}
      />
    </span>
  );
}

/** Keeps a fact and the mark that follows it on one line. */
export function Whole({ children }: { children: React.ReactNode }) {
  return <span className="whitespace-nowrap">{children}</span>;
}
