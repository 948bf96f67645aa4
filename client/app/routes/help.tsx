import { useShop } from '../../lib/shop.ts';
import { narrow } from '../../lib/spaces.ts';
import { usePageTitle } from '../../lib/use-page-title.ts';
import { Opening, Page } from '../../ui/page.tsx';
import { PartDrawing } from '../../ui/part-drawing.tsx';
import { Chapter } from '../../ui/prose.tsx';

export function Component() {
  usePageTitle('Help');
  return (
    <Page>
      <Opening>
        Short answers that <strong>work at the bench</strong>.
      </Opening>
      <Bands />
      <Measuring />
      <Counting />
      <Care />
      <Contact />
    </Page>
  );
}

function Example(props: { bands: string[]; words: string }) {
  const marking = { bands: props.bands, code: null, text: props.bands.join(' ') };
  return (
    <figure className="flex flex-wrap items-center gap-x-5 gap-y-1">
      <PartDrawing part={{ kind: 'resistor', marking, mounting: 'through-hole' }} />
      <figcaption>
        {props.bands.join(', ')}: <strong className="font-heavy">{props.words}</strong>
      </figcaption>
    </figure>
  );
}

function Bands() {
  return (
    <Chapter id="bands" title="Reading the bands">
      <p>
        Hold the resistor with the band that stands apart, the tolerance, to the right. Five bands
        are three figures, a number of zeros and the tolerance; four bands have two figures. The
        colours count from black 0, brown 1, red 2, orange 3, yellow 4, green 5, blue 6, violet 7,
        grey 8 to white 9.
      </p>
      <Example
        bands={['grey', 'grey', 'violet', 'orange', 'brown']}
        words={`887${narrow}kΩ ±${narrow}1${narrow}%`}
      />
      <Example
        bands={['yellow', 'violet', 'orange', 'gold']}
        words={`47${narrow}kΩ ±${narrow}5${narrow}%`}
      />
      <p>
        A capacitor’s three digits are picofarads: two figures and the number of zeros. 564 is 56
        {narrow}0000{narrow}pF, which is 560{narrow}nF; the letter after it is the tolerance (J is ±
        {narrow}5{narrow}%, K ±{narrow}10{narrow}%). If a colour is hard to tell, measure: out of
        circuit any multimeter reads the resistor directly.
      </p>
    </Chapter>
  );
}

function Measuring() {
  return (
    <Chapter id="measuring" title="Measuring the rate">
      <p>
        Set a multimeter or counter to Hz, black lead on ground, red lead on the point marked OUT.
        Do not measure on the capacitor: the meter’s own resistance, often 10{narrow}MΩ, sits beside
        it and slows the kit down or stops it.
      </p>
      <p>
        Wait one full beat after switching on. The first one is longer, because the capacitor starts
        empty; every later one is like the next.
      </p>
    </Chapter>
  );
}

function Counting() {
  return (
    <Chapter id="counting" title="Counting blinks">
      <p>
        For a slow blinker a watch is the better meter. Start it on a blink and call that blink
        nought; stop it on a later one. The rate is the number you stopped at, divided by the time.
        At 90 a minute, 45 blinks take half a minute, and stopping a quarter of a second late makes
        an error of under 1{narrow}%. Counting the first blink as one is the usual mistake: it makes
        every kit look fast.
      </p>
    </Chapter>
  );
}

function Care() {
  return (
    <Chapter id="care" title="Care levels">
      <p>
        The promise always counts tolerances, the temperature range and the supply range, all at
        their worst together. The care level says what it is worked out from.
      </p>
      <p>
        <strong className="font-heavy">As stocked</strong>: the values printed on the parts.
      </p>
      <p>
        <strong className="font-heavy">Lot-checked</strong>: the capacitor counts by the measured
        mean of its lot on the shelf, so a narrower band can be promised.
      </p>
      <p>
        <strong className="font-heavy">Bench-tuned</strong>: we measure the very capacitor in the
        bag and choose R4 for it. What is printed on your R4 may differ from the pack page; the
        build sheet says what is in the bag.
      </p>
      <p>
        <strong className="font-heavy">Trimmer fitted</strong>: you set the rate yourself with a
        screwdriver, by counting blinks or with a meter on Hz.
      </p>
    </Chapter>
  );
}

function Contact() {
  const shop = useShop();
  return (
    <Chapter id="contact" title="Writing to us">
      {shop === undefined ? (
        <p>The address is at the foot of this page.</p>
      ) : (
        <p>
          Write to{' '}
          <a className="link" href={`mailto:${shop.email}`}>
            {shop.email}
          </a>{' '}
          with the order’s reference and what you measured, or to {shop.name},{' '}
          {shop.address.join(', ')}.
        </p>
      )}
    </Chapter>
  );
}
