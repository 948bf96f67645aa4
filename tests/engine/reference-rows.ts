import { readFileSync } from 'node:fs';
import { createCircuit, type Circuit } from '../../server/engine/circuit.ts';

export type Row = (column: string) => string;

/** Rows of a fixture by column name; quoted fields may hold commas. */
export function referenceRows(file: string): Row[] {
  const text = readFileSync(new URL(`../fixtures/reference/${file}`, import.meta.url), 'utf8');
  const [head = '', ...lines] = text.trim().split(/\r?\n/);
  const columns = fields(head);
  return lines.map((line) => {
    const values = fields(line);
    return (column) => {
      const value = values[columns.indexOf(column)];
      if (value === undefined) throw new Error(`${file} has no column ${column}.`);
      return value;
    };
  });
}

function fields(line: string): string[] {
  const found = line.matchAll(/(?:^|,)(?:"([^"]*)"|([^",]*))/g);
  return [...found].map(([, quoted, plain]) => quoted ?? plain ?? '');
}

/** The circuit of one row of the cycle cases, where 0 stands for an absent effect. */
export function circuitOf(row: Row): Circuit {
  const number = (column: string) => Number(row(column));
  const orNull = (column: string) => (number(column) === 0 ? null : number(column));
  const openDrain = row('output_type') === 'open_drain';
  return createCircuit({
    supplyVolts: number('vcc_v'),
    celsius: number('temp_c'),
    referenceCelsius: number('tref_c'),
    r1Ohms: number('r1_ohm'),
    r2Ohms: number('r2_ohm'),
    r3Ohms: number('r3_ohm'),
    timing:
      row('timing') === 'r4'
        ? { kind: 'single', ohms: number('r4_ohm') }
        : {
            kind: 'steered',
            chargeOhms: number('rchg_ohm'),
            dischargeOhms: number('rdis_ohm'),
            diode: {
              saturationAmps: number('d_is_a'),
              emissionCoefficient: number('d_n'),
              energyGapElectronVolts: number('d_eg_ev'),
              saturationTemperatureExponent: number('d_xti'),
            },
          },
    resistorTemperatureCoefficientPerKelvin: number('tcr_ppm_per_k') * 1e-6,
    capacitor: {
      farads: number('c_f'),
      leakageOhms: orNull('rleak_ohm'),
      leakageAmps: number('ileak_a'),
      biasHalvingVolts: orNull('c_v50_v'),
      temperatureCoefficientPerKelvin: number('tcc_ppm_per_k') * 1e-6,
    },
    comparator: {
      output: openDrain ? 'open-drain' : 'push-pull',
      highVolts: openDrain ? null : number('voh_v'),
      lowVolts: number('vol_v'),
      highOhms: number('roh_ohm'),
      lowOhms: number('rol_ohm'),
      pullUpOhms: orNull('rp_ohm'),
      delayLowHighSeconds: number('tpd_lh_s'),
      delayHighLowSeconds: number('tpd_hl_s'),
      invertingBiasAmps: number('ibn_a'),
      nonInvertingBiasAmps: number('ibp_a'),
      offsetVolts: number('vos_v'),
      hysteresisVolts: number('vhyst_v'),
    },
  });
}
