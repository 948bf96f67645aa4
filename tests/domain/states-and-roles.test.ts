import { describe, expect, it } from 'vitest';
import { passwordSchema, roleSchema } from '../../server/contracts/auth.ts';
import { orderStatuses, type OrderStatus } from '../../server/contracts/orders.ts';
import { auditText } from '../../server/domain/audit-text.ts';
import { ledgerLine } from '../../server/domain/ledger-text.ts';
import { nextStatus, type OrderEvent } from '../../server/domain/order-state.ts';
import { commonPassword } from '../../server/domain/passwords.ts';
import { may, permissionTable, type Permission } from '../../server/domain/permissions.ts';

/** Rows: what happens. Columns: the state before, in the order of the interface. */
const columns = orderStatuses;
const wanted: Record<OrderEvent, string> = {
  //        awaiting  paid      picking   packed    shipped   on_hold   cancelled refunded
  pay: '    paid      -         -         -         -         -         paid      -',
  expire: ' cancelled -         -         -         -         -         -         -',
  claim: '  -         picking   -         -         -         -         -         -',
  release: '-         -         paid      -         -         -         -         -',
  pack: '   -         -         packed    -         -         -         -         -',
  ship: '   -         -         -         shipped   -         -         -         -',
  refund: ' -         refunded  refunded  refunded  refunded  refunded  -         -',
  hold: '   on_hold   on_hold   -         -         -         -         on_hold   -',
  resume: ' -         -         -         -         -         paid      -         -',
};

describe('nextStatus', () => {
  const cases = (Object.keys(wanted) as OrderEvent[]).flatMap((event) =>
    wanted[event]
      .trim()
      .split(/\s+/)
      .map((to, k): [OrderStatus, OrderEvent, string] => [columns[k]!, event, to]),
  );

  it('is asked about every state and every event', () => {
    expect(cases).toHaveLength(8 * 9);
  });

  it.each(cases)('from %s by %s leads to %s', (status, event, to) => {
    const step = nextStatus(status, event);
    if (to === '-') {
      expect(step).toEqual({ kind: 'refused', reason: expect.stringMatching(/^The order .*\.$/) });
    } else expect(step).toEqual({ kind: 'moved', to });
  });
});

describe('may', () => {
  const allowed: Record<Permission, string> = {
    'bench.see': 'packer owner',
    'bench.claim': 'packer owner',
    'bench.pick': 'packer owner',
    'bench.tune': 'packer owner',
    'bench.ship': 'packer owner',
    'desk.see': 'owner',
    'desk.change-price': 'owner',
    'desk.change-stock': 'owner',
    'desk.refund': 'owner',
    'desk.audit': 'owner',
    'orders.own': 'customer packer owner',
  };

  it.each(Object.keys(permissionTable) as Permission[])(
    'lets the right roles do %s',
    (permission) => {
      const roles = roleSchema.options.filter((role) => may(role, permission));
      expect(roles).toEqual(allowed[permission].split(' '));
      expect(may(null, permission)).toBe(false);
    },
  );
});

describe('passwords (NIST SP 800-63B-4, 3.1.1.2)', () => {
  const accepts = (text: string) => passwordSchema.safeParse(text).success;

  it('need 15 characters and no rule of composition', () => {
    expect(accepts('fourteen chars')).toBe(false);
    expect(accepts('fifteen letters')).toBe(true);
    expect(accepts('              .')).toBe(true);
    expect(accepts('🕰️'.repeat(7))).toBe(false);
    expect(accepts('🔧'.repeat(15))).toBe(true);
  });

  it('may be long, but not without end', () => {
    expect(accepts('ß and 🔋 '.repeat(8))).toBe(true);
    expect(accepts('x y'.repeat(66))).toBe(true);
    expect(accepts('x'.repeat(201))).toBe(false);
  });

  it.each([
    'aaaaaaaaaaaaaaa',
    'abababababababab',
    'abcdefabcdefabcdef',
    '123456789012345',
    'Password 2026 !!!',
    'tockwelltockwell',
    'correct-horse-battery-staple',
    '1111 1111 1111 1111',
  ])('are refused when guessers try them first: %s', (text) => {
    expect(commonPassword(text, [])).toBe(true);
  });

  it('are refused when they are the person’s own address or name', () => {
    const own = ['tove.marlin.long@eelmouth.example', 'Tove Marlin the Third'];
    expect(commonPassword('Tove.Marlin.Long@eelmouth.example', own)).toBe(true);
    expect(commonPassword('tove.marlin.long', own)).toBe(true);
    expect(commonPassword('tove marlin the third', own)).toBe(true);
    expect(commonPassword('tove marlin was here', own)).toBe(false);
  });

  it.each([
    'merrow-quay-demo',
    'four words in a row',
    'the tide clock ticks',
    'ten green lanterns',
  ])('are accepted when nobody would guess them first: %s', (text) => {
    expect(commonPassword(text, ['a@b.example'])).toBe(false);
  });
});

describe('auditText', () => {
  it.each([
    [null, null],
    [undefined, null],
    ['text', 'text'],
    [7, '7'],
    [{ amount: 1205, currency: 'EUR' }, '€\u00a012.05'],
    [{ lot: 3, onHand: 9 }, 'lot 3, onHand 9'],
    [
      { status: 'paid', amount: { amount: 100, currency: 'EUR' } },
      'status paid, amount €\u00a01.00',
    ],
    [{ note: null }, 'note none'],
  ])('says %o as %s', (value, text) => {
    expect(auditText(value)).toBe(text);
  });
});

describe('ledgerLine', () => {
  const facts = {
    at: new Date('2026-12-01T10:00:00Z'),
    who: 'Ivo Brandreth',
    reason: 'shipped' as const,
    note: null,
    orderRef: 'TQ-1041',
    partName: 'LED, red',
    lot: '2601-A',
    bin: 'R-01',
    from: 10,
    to: 8,
  };

  it('names the part where the line stands among others', () => {
    expect(ledgerLine(facts, true).what).toBe('LED, red, Shipped, TQ-1041');
    expect(ledgerLine(facts, true)).toMatchObject({
      from: 10,
      to: 8,
      at: '2026-12-01T10:00:00.000Z',
    });
  });

  it('leaves it out under the part’s own heading, and adds a note', () => {
    const counted = { ...facts, reason: 'counted' as const, orderRef: null, note: 'spilt some' };
    expect(ledgerLine(counted, false).what).toBe('Counted, spilt some');
  });
});
