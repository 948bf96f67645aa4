import type { ReactNode } from 'react';

/** A part of a text page, with its own address. */
export function Chapter({
  id,
  title,
  children,
}: {
  id: string;
  title: string;
  children: ReactNode;
}) {
  return (
    <section
      aria-labelledby={id}
      className="grid gap-x-12 gap-y-2 border-t border-line py-7 lg:grid-cols-[18rem_1fr]"
    >
      <h2 id={id} className="scroll-mt-6 text-title font-strong">
        {title}
      </h2>
      <div className="max-w-[62ch] space-y-3">{children}</div>
    </section>
  );
}
