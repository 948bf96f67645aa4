import { screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { useState } from 'react';
import { describe, expect, it } from 'vitest';
import { BriefSentence } from '../../../client/features/brief/components/brief-sentence.tsx';
import { defaultDraft, readDraft } from '../../../client/features/brief/model.ts';
import { renderInShop, sampleShop } from '../support/render.tsx';

function Harness() {
  const [draft, setDraft] = useState(defaultDraft);
  return (
    <BriefSentence
      draft={draft}
      errors={readDraft(draft, sampleShop).errors ?? {}}
      change={(patch) => setDraft({ ...draft, ...patch })}
    />
  );
}

const control = (name: string) => screen.getByLabelText(name);

describe('BriefSentence', () => {
  it('makes every fact of the sentence a labelled control', () => {
    renderInShop(<Harness />);
    const values = [
      ['What it drives', 'red'],
      ['Rate', '90'],
      ['Unit of the rate', 'per_minute'],
      ['Lit share in words', '50'],
      ['Supply', 'TW-AA2'],
      ['Band, per cent either side', '5'],
      ['Lowest temperature, degrees Celsius', '0'],
      ['Highest temperature, degrees Celsius', '40'],
    ] as const;
    for (const [name, value] of values) {
      expect((control(name) as HTMLInputElement).value, name).toBe(value);
    }
  });

  it('rewrites itself for a logic clock', async () => {
    renderInShop(<Harness />);
    await userEvent.selectOptions(control('What it drives'), 'clock');
    expect(screen.getByRole('search').textContent).toMatch(/tick .*high for .*of each cycle/);
    expect(control('High share in words')).toBeTruthy();
  });

  it('turns a rate into a time of one beat when the unit is a period', async () => {
    renderInShop(<Harness />);
    await userEvent.selectOptions(control('Unit of the rate'), 's');
    expect(screen.getByRole('search').textContent).toMatch(/blink every/);
    expect(control('Time of one beat')).toBeTruthy();
  });

  it('opens a number for another share of the beat', async () => {
    renderInShop(<Harness />);
    await userEvent.selectOptions(control('Lit share in words'), 'typed');
    const share = control('Lit share of each beat');
    await userEvent.clear(share);
    await userEvent.type(share, '35');
    expect((share as HTMLInputElement).value).toBe('35');
  });

  it('says beside the sentence what is wrong with a fact', async () => {
    renderInShop(<Harness />);
    await userEvent.clear(control('Rate'));
    expect(screen.getByRole('alert').textContent).toMatch(
      /Type a rate above zero and not above a thousand million/,
    );
    expect(control('Rate').getAttribute('aria-invalid')).toBe('true');
    const described = control('Rate').getAttribute('aria-describedby') ?? '';
    expect(document.getElementById(described)?.textContent).toMatch(/Type a rate/);
  });
});
