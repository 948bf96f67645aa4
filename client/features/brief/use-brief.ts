import { useEffect, useRef, useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import { draftFromQuery, queryFromDraft } from './model.ts';
import type { BriefDraft } from './model.ts';

const restMilliseconds = 200;

export interface BriefState {
  /** What stands in the controls now. */
  draft: BriefDraft;
  /** What stood there when the typing last rested: what the shop is asked, and the page's address. */
  settled: BriefDraft;
  change: (patch: Partial<BriefDraft>) => void;
}

/** The brief of this page. Its home is the address, so it can be bookmarked, sent and stepped back to. */
export function useBrief(): BriefState {
  const [query, setQuery] = useSearchParams();
  const address = query.toString();
  const [draft, setDraft] = useState(() => draftFromQuery(query));
  const [seen, setSeen] = useState(address);
  const [written, setWritten] = useState(address);
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);

  // A new address that did not come from typing here (a link, the back button) resets the controls.
  if (address !== seen) {
    setSeen(address);
    if (address !== written) setDraft(draftFromQuery(query));
  }

  useEffect(() => () => clearTimeout(timer.current), []);

  const change = (patch: Partial<BriefDraft>) => {
    const next = { ...draft, ...patch };
    setDraft(next);
    clearTimeout(timer.current);
    timer.current = setTimeout(() => {
      const text = queryFromDraft(next);
      setWritten(text);
      setQuery(text, { replace: true, preventScrollReset: true });
    }, restMilliseconds);
  };
  return { draft, settled: draftFromQuery(query), change };
}
