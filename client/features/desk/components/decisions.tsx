import { Link } from 'react-router-dom';
import type { DeskToday } from '../../../../server/contracts/desk.ts';
import { bindUnits } from '../../../lib/spaces.ts';

/** What needs the owner, in sentences, each with where to go. */
export function Decisions({ decisions }: { decisions: DeskToday['decisions'] }) {
  return (
    <section aria-labelledby="decisions">
      <h2 id="decisions" className="mb-2 text-title font-strong">
        Wants a decision
      </h2>
      {decisions.length === 0 ? (
        <p className="border-t-2 border-ink py-3 text-soft">Nothing just now.</p>
      ) : (
        <ol className="border-t-2 border-ink">
          {decisions.map((decision) => (
            <li
              key={`${decision.path} ${decision.text}`}
              className="ledger-line grid grid-cols-[3.5rem_1fr] gap-x-4 gap-y-1 py-3 sm:grid-cols-[3.5rem_1fr_auto]"
            >
              <span className={decision.when === 'now' ? 'font-heavy' : 'text-soft'}>
                {decision.when}
              </span>
              <span>{bindUnits(decision.text)}</span>
              <Link
                className="link py-1 max-sm:col-start-2 sm:-my-1"
                to={decision.path}
                aria-label={`${decision.action}: ${decision.text}`}
              >
                {decision.action}
              </Link>
            </li>
          ))}
        </ol>
      )}
    </section>
  );
}
