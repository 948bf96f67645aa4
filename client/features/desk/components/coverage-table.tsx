import { useState } from 'react';
import type { Coverage } from '../../../../server/contracts/desk.ts';
import { formatPercent } from '../../../lib/format-number.ts';
import { narrow } from '../../../lib/spaces.ts';
import { Button } from '../../../ui/button.tsx';
import { Dialog } from '../../../ui/dialog.tsx';
import { Table } from '../../../ui/table.tsx';
import { isHeld, rateWords } from '../coverage.ts';

/** The ribbon's figures in rows, for those who read rather than look. */
export function CoverageTable({ coverage }: { coverage: Coverage }) {
  const [open, setOpen] = useState(false);
  const asked = `±${narrow}${formatPercent(coverage.band)}`;
  return (
    <>
      <Button look="plain" size="small" className="-mr-3" onClick={() => setOpen(true)}>
        Read it as a table
      </Button>
      <Dialog open={open} onOpenChange={setOpen} title="What the shelves hold, rate by rate">
        <Table
          caption="Best guaranteed band at each rate"
          rows={coverage.points}
          rowKey={(point) => String(point.frequencyHz)}
          columns={[
            {
              key: 'rate',
              head: 'Rate',
              isRowHead: true,
              cell: (point) => rateWords(point.frequencyHz),
            },
            {
              key: 'band',
              head: 'Best band',
              align: 'end',
              cell: (point) =>
                point.halfBand === null ? 'no pack' : `±${narrow}${formatPercent(point.halfBand)}`,
            },
            {
              key: 'held',
              head: `Within ${asked}`,
              align: 'end',
              cell: (point) => (isHeld(point, coverage.band) ? 'held' : 'not held'),
            },
          ]}
        />
      </Dialog>
    </>
  );
}
