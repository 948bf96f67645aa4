/**
 * One state of the output, seen from the capacitor. Voltages are the capacitor's unless said
 * otherwise; a state's run begins at the other state's end and heads for `tripVolts`.
 */
export interface StateBranch {
  /** Capacitor voltage at which the comparator trips out of this state; NaN when it has none. */
  tripVolts: number;
  /** Voltage the capacitor would settle at, or NaN when it has no closed form (steered). */
  settlingVolts: number;
  /** Whether the capacitor reaches `tripVolts` and crosses it. */
  reachesTrip: boolean;
  /** R·C of the exponential, or null when the run is not one exponential. */
  tauSeconds: number | null;
  /** Forward voltage left across resistor and diode at the trip over n·V_t; null when not steered. */
  headroom: number | null;
  /** Time from one capacitor voltage to a later one on this state's run. */
  secondsBetween(fromVolts: number, toVolts: number): number;
  /** Capacitor voltage `seconds` after it was `fromVolts`. */
  voltsAfter(fromVolts: number, seconds: number): number;
  /** Current out of the output node into the timing branch; negative when it sinks. */
  timingAmpsAt(volts: number): number;
  /** Voltage of the output node. */
  outputVoltsAt(volts: number): number;
  /** Voltage of the reference node. */
  referenceVoltsAt(volts: number): number;
}
