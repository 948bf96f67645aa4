import type { ReactNode } from 'react';

export interface Bar {
  key: string;
  name: ReactNode;
  /** Length of the bar, 0…1 of the longest. */
  share: number;
  value: ReactNode;
}

/** A table whose middle column draws each figure as a bar; the figures themselves stand beside it. */
export function BarTable(props: {
  caption: string;
  heads: readonly [string, string];
  bars: readonly Bar[];
  /** A last row for the sum. */
  total?: ReactNode;
}) {
  return (
    <table className="w-full border-collapse">
      <caption className="sr-only">{props.caption}</caption>
      <thead className="sr-only">
        <tr>
          <th scope="col">{props.heads[0]}</th>
          <th scope="col">{props.heads[1]}</th>
        </tr>
      </thead>
      <tbody>
        {props.bars.map((bar) => (
          <tr key={bar.key}>
            <th scope="row" className="w-[38%] py-1.5 pr-3 text-left leading-tight font-normal">
              {bar.name}
            </th>
            <td className="py-1.5 text-right font-strong whitespace-nowrap">
              <span className="flex items-center gap-3">
                <svg
                  aria-hidden="true"
                  viewBox="0 0 100 10"
                  preserveAspectRatio="none"
                  className="h-4 min-w-0 flex-1"
                >
                  <rect
                    width={Math.max(0.6, bar.share * 100)}
                    height="10"
                    className="fill-spruce"
                  />
                </svg>
                <span className="w-24 shrink-0">{bar.value}</span>
              </span>
            </td>
          </tr>
        ))}
      </tbody>
      {props.total !== undefined && (
        <tfoot>
          <tr className="border-t border-line font-heavy">
            <th scope="row" className="py-1.5 text-left">
              Together
            </th>
            <td className="py-1.5 text-right whitespace-nowrap">{props.total}</td>
          </tr>
        </tfoot>
      )}
    </table>
  );
}
