import type { ReactNode } from 'react';
import { clsx } from 'clsx';

/** The column every page stands in. */
export function Page({ children, className }: { children: ReactNode; className?: string }) {
  return (
    <div className={clsx('mx-auto w-full max-w-[80rem] px-4 sm:px-8 lg:px-14', className)}>
      {children}
    </div>
  );
}

/** A page opens with a sentence in large light type; its facts are heavy. */
export function Opening({ children }: { children: ReactNode }) {
  return (
    <h1 className="max-w-[26em] py-8 text-[clamp(1.75rem,1.1rem+2.6vw,2.5rem)] leading-[1.25] font-light [&_strong]:font-heavy">
      {children}
    </h1>
  );
}
