import type { ReactNode } from 'react';

function Cord() {
  return (
    <svg aria-hidden="true" viewBox="0 0 24 92" className="tag-cord" preserveAspectRatio="none">
      <path d="M12 4C7.5 20 7 38 10 52.5" className="fill-none stroke-cord" strokeWidth="1.75" />
      <path d="M12 4C16.5 26 16 60 12.5 88" className="fill-none stroke-cord" strokeWidth="1.75" />
      <ellipse
        cx="12"
        cy="5"
        rx="3.5"
        ry="7"
        className="fill-none stroke-cord"
        strokeWidth="2.25"
      />
    </svg>
  );
}

/** The rail that tags hang from; on a phone the tags hang one below the other. */
export function Rail({ children, label }: { children: ReactNode; label: string }) {
  return (
    <div>
      <div aria-hidden="true" className="rail mx-1" />
      <ul
        aria-label={label}
        className="grid gap-x-6 gap-y-16 pt-10 md:grid-cols-2 lg:grid-cols-3 lg:gap-x-8"
      >
        {children}
      </ul>
    </div>
  );
}

/** One hook on the rail, with the cord that runs through the tag's hole. */
export function RailHook({ children }: { children: ReactNode }) {
  return (
    <li className="tag-hung relative flex animate-hang">
      {children}
      <Cord />
    </li>
  );
}
