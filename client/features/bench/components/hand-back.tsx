import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import type { BenchOrder } from '../../../../server/contracts/bench.ts';
import { sentenceOf } from '../../../lib/problem-error.ts';
import { Button } from '../../../ui/button.tsx';
import { Dialog } from '../../../ui/dialog.tsx';
import { Notice } from '../../../ui/notice.tsx';
import { useMove } from '../api/bench-order.ts';
import { benchPaths } from '../bench-paths.ts';

/** Gives the order back to the queue, after saying what that means for the tray. */
export function HandBack({ order }: { order: BenchOrder }) {
  const [asking, setAsking] = useState(false);
  const release = useMove(order.ref);
  const navigate = useNavigate();
  const inTray = order.picks.some((pick) => pick.picked > 0);
  return (
    <div className="no-print mt-10 border-t border-line pt-3">
      <Button look="plain" size="bench" className="-ml-6" onClick={() => setAsking(true)}>
        Hand this order back
      </Button>
      <Dialog
        open={asking}
        onOpenChange={setAsking}
        title={`Hand ${order.ref} back?`}
        description={
          inTray
            ? 'Put what is in the tray back into its bins first. Whoever claims it next starts the walk anew.'
            : 'It goes back to the queue for whoever claims it next.'
        }
      >
        {release.isError && (
          <Notice tone="danger" urgent className="mb-4">
            {sentenceOf(release.error)}
          </Notice>
        )}
        <div className="flex flex-wrap gap-4">
          <Button
            size="bench"
            busy={release.isPending}
            busyWords="Handing it back"
            onClick={() =>
              release.mutate('release', {
                onSuccess: () => void navigate(benchPaths.queue.link()),
              })
            }
          >
            Hand it back
          </Button>
          <Button size="bench" look="outline" onClick={() => setAsking(false)}>
            Keep it
          </Button>
        </div>
      </Dialog>
    </div>
  );
}
