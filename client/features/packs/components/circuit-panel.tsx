import type { Drawing } from '../../../../server/contracts/drawing.ts';
import { Schematic } from '../../../ui/schematic.tsx';

/** The circuit on ruled paper, and the same connections in words. */
export function CircuitPanel(props: {
  drawing: Drawing;
  lit: ReadonlySet<string>;
  onLight: (roles: readonly string[]) => void;
}) {
  return (
    <figure className="min-w-0">
      <div className="ruled border border-line px-3 py-6 sm:py-10 sm:pr-8 sm:pl-14">
        <Schematic
          drawing={props.drawing}
          lit={props.lit}
          onLight={(role) => props.onLight(role === null ? [] : [role])}
          onPress={(role) => props.onLight([role])}
          label="Circuit diagram; the connections are listed in words below it"
        />
      </div>
      <figcaption>
        <details>
          <summary className="inline-block py-2 font-strong text-spruce underline underline-offset-4">
            The connections in words
          </summary>
          <ul className="list-disc space-y-1 pb-2 pl-5">
            {props.drawing.description.map((sentence) => (
              <li key={sentence}>{sentence}</li>
            ))}
          </ul>
        </details>
      </figcaption>
    </figure>
  );
}
