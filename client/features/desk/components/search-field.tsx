import { useEffect, useState } from 'react';
import { useDebounced } from '../../../lib/use-debounced.ts';
import { Field } from '../../../ui/field.tsx';

const longest = 100;

/** A search that follows the typing a moment later, and the address when that changes by other means. */
export function SearchField(props: {
  label: string;
  value: string;
  hint?: string;
  onSearch: (text: string) => void;
}) {
  const { value, onSearch } = props;
  const [text, setText] = useState(value);
  const [known, setKnown] = useState(value);
  const settled = useDebounced(text, 250);
  if (value !== known) {
    setKnown(value);
    if (value !== text.trim()) setText(value);
  }
  useEffect(() => {
    const wanted = settled.trim();
    if (wanted !== value && settled === text) onSearch(wanted);
  }, [settled, text, value, onSearch]);
  return (
    <Field
      type="search"
      label={props.label}
      hint={props.hint}
      value={text}
      maxLength={longest}
      autoComplete="off"
      onChange={(event) => setText(event.target.value)}
    />
  );
}
