import { useState } from 'react';
import type { BenchOrder, ReadingResponse } from '../../../../server/contracts/bench.ts';
import { newIdempotencyKey } from '../../../lib/http.ts';
import { sentenceOf } from '../../../lib/problem-error.ts';
import { bindUnits } from '../../../lib/spaces.ts';
import { Button } from '../../../ui/button.tsx';
import { useReading } from '../api/bench-order.ts';
import { nextKit, picksWith } from '../walk.ts';
import type { Kit } from '../walk.ts';
import { ReadingField } from './reading-field.tsx';
import { TunedAnswer } from './tuned-answer.tsx';
import { TunedKits } from './tuned-kits.tsx';

export interface TuneViewProps {
  order: BenchOrder;
  onTook: (picks: { id: string; quantity: number }[]) => void;
  onMeasured: () => void;
  onDone: () => void;
}

/** The meter: one kit after the other, its reading in, its R4 out. */
export function TuneView({ order, onTook, onMeasured, onDone }: TuneViewProps) {
  const reading = useReading(order.ref);
  const [chosen, setChosen] = useState<{ lineId: string; unit: number } | null>(null);
  const [answer, setAnswer] = useState<ReadingResponse | null>(null);
  const again = order.lines.find((line) => line.id === chosen?.lineId);
  const kit = again && chosen ? { line: again, unit: chosen.unit } : nextKit(order);
  const answered = order.lines.find((line) => line.id === answer?.lineId)?.tuning;
  const measure = (lineId: string, unit: number) => {
    setAnswer(null);
    setChosen({ lineId, unit });
    reading.reset();
  };
  if (answer !== null && answered) {
    const isLast = nextKit(order) === null;
    return (
      <TunedAnswer
        answer={answer}
        tuning={answered}
        isLast={isLast}
        onTook={() => {
          onTook(picksWith(order, answer.take));
          setAnswer(null);
          if (isLast) onDone();
        }}
        onAgain={() => measure(answer.lineId, answer.unit)}
      />
    );
  }
  const send = ({ line, unit }: Kit, text: string) =>
    reading.mutate(
      { lineId: line.id, unit, reading: text, key: newIdempotencyKey() },
      {
        onSuccess: (found) => {
          setAnswer(found);
          setChosen(null);
          onMeasured();
        },
      },
    );
  return (
    <section aria-label="At the meter" className="animate-rise">
      {kit === null ? (
        <Button size="bench" className="mt-5 min-h-20 text-title" onClick={onDone}>
          All kits are tuned, go on
        </Button>
      ) : (
        <KitAtTheMeter
          key={`${kit.line.id} ${kit.unit}`}
          kit={kit}
          error={reading.isError ? sentenceOf(reading.error) : null}
          busy={reading.isPending}
          onReading={(text) => send(kit, text)}
        />
      )}
      <TunedKits order={order} onAgain={measure} />
    </section>
  );
}

function KitAtTheMeter(props: {
  kit: Kit;
  error: string | null;
  busy: boolean;
  onReading: (text: string) => void;
}) {
  const { line, unit } = props.kit;
  if (line.tuning === null) return null;
  const { capacitor, from, to } = line.tuning;
  const place = line.quantity === 1 ? 'the kit' : `kit ${unit} of ${line.quantity}`;
  return (
    <>
      <h1 className="mt-4 text-[clamp(2rem,5vw,4rem)] leading-[1.1] font-light">
        Measure <strong className="font-heavy">C1</strong> for{' '}
        <strong className="font-heavy">{place}</strong>.
      </h1>
      <p className="mt-2 text-soft">{bindUnits(line.sentence)}</p>
      <ReadingField
        label={`Reading of C1, ${place}`}
        hint={bindUnits(
          `${capacitor}: a good one reads ${from} to ${to}. Type it with its unit, as 818.2n or 0.8182u.`,
        )}
        error={props.error}
        busy={props.busy}
        onReading={props.onReading}
      />
    </>
  );
}
