import type { PackPage } from '../../../../server/contracts/packs.ts';
import { formatDigits, formatQuantity } from '../../../lib/format-number.ts';
import { Waveform } from '../../../ui/waveform.tsx';

/** From power-on: the picture, and its figures as a list for those who don't see it. */
export function WaveformSection({ page }: { page: PackPage }) {
  const { waveform, pack } = page;
  const longer = waveform.firstHighSeconds / (waveform.periodSeconds * pack.promise.duty);
  const rows = [
    ['First high', waveform.firstHighSeconds, 's'],
    ['Every later high', waveform.periodSeconds * pack.promise.duty, 's'],
    ['Every low', waveform.periodSeconds * (1 - pack.promise.duty), 's'],
    ['Lower threshold', waveform.thresholdLowVolts, 'V'],
    ['Upper threshold', waveform.thresholdHighVolts, 'V'],
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
        {rows.map(([name, value, unit]) => (
          <div key={name}>
            <dt className="text-small text-soft">{name}</dt>
            <dd className="font-heavy">{formatQuantity(value, unit)}</dd>
          </div>
        ))}
      </dl>
    </section>
  );
}
