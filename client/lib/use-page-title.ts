import { useEffect } from 'react';

/** Names the page in the browser's title bar. */
export function usePageTitle(title: string): void {
  useEffect(() => {
    document.title = `${title} – Tockwell`;
  }, [title]);
}
