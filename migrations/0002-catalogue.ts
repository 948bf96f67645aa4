import type { Knex } from 'knex';

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table parts (
      id int generated always as identity primary key,
      sku text not null constraint parts_sku_once unique check (sku ~ '^[A-Z0-9][A-Z0-9-]{1,39}$'),
      kind text not null check (kind in
        ('resistor', 'capacitor', 'comparator', 'led', 'diode', 'board', 'battery', 'holder', 'trimmer')),
      name text not null check (name <> ''),
      mounting text not null check (mounting in ('through-hole', 'surface-mount')),
      active boolean not null default true,
      cost_minor int not null check (cost_minor >= 0),
      price_minor int not null check (price_minor >= 0),
      currency char(3) not null default 'EUR' check (currency = 'EUR'),
      grams numeric not null default 0 check (grams >= 0),
      created_at timestamptz not null default now(),

      ohms double precision check (ohms > 0 and ohms < 1e10),
      tolerance double precision check (tolerance > 0 and tolerance < 1),
      temperature_coefficient_per_kelvin double precision
        check (abs(temperature_coefficient_per_kelvin) < 0.01),
      rated_watts double precision check (rated_watts > 0),

      farads double precision check (farads > 0 and farads < 1),
      dielectric text check (dielectric in ('C0G', 'X7R', 'film-pp', 'film-pet', 'electrolytic')),
      rated_volts double precision check (rated_volts > 0),
      temperature_spread double precision check (temperature_spread >= 0 and temperature_spread < 1),
      insulation_seconds double precision check (insulation_seconds > 0),
      leakage_amps double precision check (leakage_amps >= 0),
      bias_halving_volts double precision check (bias_halving_volts > 0),
      polarised boolean,

      output text check (output in ('push-pull', 'open-drain')),
      sections int check (sections in (1, 2, 4)),
      supply_min_volts double precision check (supply_min_volts > 0),
      supply_max_volts double precision check (supply_max_volts > supply_min_volts),
      delay_low_high_seconds double precision check (delay_low_high_seconds >= 0),
      delay_high_low_seconds double precision check (delay_high_low_seconds >= 0),
      max_delay_seconds double precision,
      input_bias_amps double precision,
      max_input_bias_amps double precision,
      offset_volts double precision,
      max_offset_volts double precision,
      hysteresis_volts double precision check (hysteresis_volts >= 0),
      high_ohms double precision check (high_ohms >= 0),
      low_ohms double precision check (low_ohms >= 0),
      max_output_amps double precision check (max_output_amps > 0),
      quiescent_amps double precision check (quiescent_amps > 0),
      max_quiescent_amps double precision check (max_quiescent_amps >= quiescent_amps),

      colour text check (colour in ('red', 'orange', 'yellow', 'green', 'blue')),
      forward_volts double precision check (forward_volts > 0),
      min_forward_volts double precision check (min_forward_volts <= forward_volts),
      max_forward_volts double precision check (max_forward_volts >= forward_volts),
      max_amps double precision check (max_amps > 0),

      saturation_amps double precision check (saturation_amps > 0),
      emission_coefficient double precision check (emission_coefficient > 0),
      energy_gap_electron_volts double precision check (energy_gap_electron_volts > 0),
      saturation_temperature_exponent double precision,

      cell_size text check (cell_size in ('AA', 'AAA')),
      cells int check (cells between 1 and 8),
      nominal_volts double precision check (nominal_volts > 0),
      fresh_volts double precision check (fresh_volts >= nominal_volts),
      empty_volts double precision check (empty_volts > 0 and empty_volts <= nominal_volts),
      capacity_amp_hours double precision check (capacity_amp_hours > 0),

      constraint parts_resistor_complete check (kind not in ('resistor', 'trimmer') or
        num_nulls(ohms, tolerance, temperature_coefficient_per_kelvin, rated_watts) = 0),
      constraint parts_capacitor_complete check (kind <> 'capacitor' or
        num_nulls(farads, tolerance, dielectric, rated_volts, temperature_coefficient_per_kelvin,
          temperature_spread, leakage_amps, polarised) = 0),
      constraint parts_comparator_complete check (kind <> 'comparator' or
        num_nulls(output, sections, supply_min_volts, supply_max_volts, delay_low_high_seconds,
          delay_high_low_seconds, max_delay_seconds, input_bias_amps, max_input_bias_amps, offset_volts,
          max_offset_volts, hysteresis_volts, high_ohms, low_ohms, max_output_amps, quiescent_amps,
          max_quiescent_amps) = 0),
      constraint parts_led_complete check (kind <> 'led' or
        num_nulls(colour, forward_volts, min_forward_volts, max_forward_volts, max_amps) = 0),
      constraint parts_diode_complete check (kind <> 'diode' or
        num_nulls(saturation_amps, emission_coefficient, energy_gap_electron_volts,
          saturation_temperature_exponent) = 0),
      constraint parts_board_complete check (kind <> 'board' or sections is not null),
      constraint parts_battery_complete check (kind <> 'battery' or
        num_nulls(cell_size, cells, nominal_volts, fresh_volts, empty_volts, capacity_amp_hours) = 0),
      constraint parts_holder_complete check (kind <> 'holder' or num_nulls(cell_size, cells) = 0)
    );
    create index parts_by_kind on parts (kind, active);

    create table bins (
      id int generated always as identity primary key,
      code text not null constraint bins_code_once unique check (code ~ '^[A-Z]-[0-9]{2}$'),
      walk_order int not null constraint bins_walk_once unique,
      place text not null
    );

    create table lots (
      id int generated always as identity primary key,
      part_id int not null references parts (id),
      bin_id int not null references bins (id),
      code text not null,
      received_on date not null,
      on_hand int not null default 0 check (on_hand >= 0),
      reserved int not null default 0 check (reserved >= 0),
      measured_mean double precision check (measured_mean > 0),
      measured_deviation double precision check (measured_deviation >= 0),
      measured_count int check (measured_count > 0),
      constraint lots_code_once unique (part_id, code),
      constraint lots_reserved_within_on_hand check (reserved <= on_hand),
      constraint lots_measured_whole check (num_nulls(measured_mean, measured_deviation, measured_count) in (0, 3))
    );
    create index lots_by_part on lots (part_id, id);
    create index lots_by_bin on lots (bin_id);
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('drop table lots, bins, parts');
}
