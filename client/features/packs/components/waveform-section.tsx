import type { PackPage } from '../../../../server/contracts/packs.ts';
import { formatDigits, formatQuantity, formatVolts } from '../../../lib/format-number.ts';
import { Waveform } from '../../../ui/waveform.tsx';

/** From power-on: the picture, and its figures as a list for those who don't see it. */
export function WaveformSection({ page }: { page: PackPage }) {
  const { waveform, pack } = page;
  const longer = waveform.firstHighSeconds / (waveform.periodSeconds * pack.promise.duty);
  const seconds = (value: number) => formatQuantity(value, 's');
  const rows = [
    ['First high', seconds(waveform.firstHighSeconds)],
    ['Every later high', seconds(waveform.periodSeconds * pack.promise.duty)],
    ['Every low', seconds(waveform.periodSeconds * (1 - pack.promise.duty))],
    ['Lower threshold', formatVolts(waveform.thresholdLowVolts)],
    ['Upper threshold', formatVolts(waveform.thresholdHighVolts)],
  ] as const;
  return (
    <section aria-labelledby="waveforms">
      <h2 id="waveforms" className="text-title font-strong">
        The first high lasts {formatDigits(longer, 2)} times as long, then it settles for good.
      </h2>
      <p className="mt-1 text-soft">
        The capacitor starts empty, so it has further to climb before the first turn.
      </p>
      <div className="mt-4">
        <Waveform {...waveform} />
      </div>
      <dl className="mt-4 grid grid-cols-2 gap-x-6 gap-y-2 sm:grid-cols-5">
        {rows.map(([name, value]) => (
          <div key={name}>
            <dt className="text-small text-soft">{name}</dt>
            <dd className="font-heavy">{value}</dd>
          </div>
        ))}
      </dl>
    </section>
  );
}
