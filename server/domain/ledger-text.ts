const reasonWords = {
  opening: 'Opening stock',
  counted: 'Counted',
  received: 'Received',
  damaged: 'Damaged',
  lost: 'Lost',
  found: 'Found',
  returned: 'Returned',
  shipped: 'Shipped',
} as const;

export interface LedgerFacts {
  at: Date;
  who: string;
  reason: keyof typeof reasonWords;
  note: string | null;
  orderRef: string | null;
  partName: string;
  lot: string;
  bin: string;
  from: number;
  to: number;
}

/** A stock movement as a ledger line: when, who, what, from → to; the part is named where wanted. */
export function ledgerLine(facts: LedgerFacts, withPart: boolean) {
  const words = [
    withPart ? facts.partName : '',
    reasonWords[facts.reason],
    facts.orderRef ?? '',
    facts.note ?? '',
  ];
  return {
    at: facts.at.toISOString(),
    who: facts.who,
    what: words.filter((text) => text !== '').join(', '),
    lot: facts.lot,
    bin: facts.bin,
    from: facts.from,
    to: facts.to,
  };
}
