import { useState } from 'react';
import type { DeskPart } from '../../../../server/contracts/desk.ts';
import { formatDate } from '../../../lib/format-time.ts';
import { Button } from '../../../ui/button.tsx';
import { Dialog } from '../../../ui/dialog.tsx';
import { LiveRegion } from '../../../ui/live-region.tsx';
import { StockForm } from './stock-form.tsx';

type Lot = DeskPart['lots'][number];

/** Where the part lies: a line for every lot, the bin first, as one walks to it. */
export function Lots({ part }: { part: DeskPart }) {
  const [counting, setCounting] = useState<string | null>(null);
  const [said, setSaid] = useState('');
  const lot = part.lots.find((each) => each.id === counting);
  return (
    <section aria-labelledby="lots">
      <h2 id="lots" className="mb-2 text-title font-strong">
        Where it lies
      </h2>
      <LiveRegion words={said} />
      {part.lots.length === 0 ? (
        <p className="border-t-2 border-ink py-3 text-soft">In no bin; no lot was ever received.</p>
      ) : (
        <ul className="border-t-2 border-ink">
          {part.lots.map((each) => (
            <LotLine key={each.id} lot={each} onCount={() => setCounting(each.id)} />
          ))}
        </ul>
      )}
      <Dialog
        open={lot !== undefined}
        onOpenChange={() => setCounting(null)}
        title={`Correct bin ${lot?.bin ?? ''}`}
        description={lot && `Lot ${lot.code}: the ledger says ${lot.onHand}.`}
      >
        {lot !== undefined && (
          <StockForm
            part={part}
            lot={lot}
            onDone={(onHand) => {
              setCounting(null);
              setSaid(`Bin ${lot.bin} now holds ${onHand}.`);
            }}
          />
        )}
      </Dialog>
    </section>
  );
}

function LotLine({ lot, onCount }: { lot: Lot; onCount: () => void }) {
  return (
    <li className="ledger-line grid grid-cols-[auto_1fr] items-center gap-x-6 gap-y-2 py-3 sm:grid-cols-[7rem_1fr_auto]">
      <span className="text-head leading-none font-heavy whitespace-nowrap">{lot.bin}</span>
      <span>
        <strong className="font-heavy">{lot.onHand}</strong> on hand
        {lot.reserved > 0 && `, ${lot.reserved} of them promised`}
        <span className="block text-small text-soft">
          lot {lot.code}, received {formatDate(lot.receivedOn)}
        </span>
      </span>
      <Button
        look="outline"
        size="small"
        className="max-sm:col-span-2 max-sm:justify-self-start"
        aria-label={`Correct the count of bin ${lot.bin}, lot ${lot.code}`}
        onClick={onCount}
      >
        Correct the count
      </Button>
    </li>
  );
}
