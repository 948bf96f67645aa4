CREATE FUNCTION public.lots_move_by_ledger_only() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
    begin
      if tg_op = 'INSERT' and (new.on_hand <> 0 or new.reserved <> 0) then
        raise exception 'a new lot starts empty; post its opening to the ledger' using errcode = 'restrict_violation';
      end if;
      if tg_op = 'UPDATE' and (new.on_hand <> old.on_hand or new.reserved <> old.reserved)
          and pg_trigger_depth() < 2 then
        raise exception 'on hand and reserved move by ledger and reservations only' using errcode = 'restrict_violation';
      end if;
      return new;
    end $$;

CREATE FUNCTION public.lots_notify() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
    begin
      if tg_op = 'INSERT' then
        perform notify_shelves(array(select distinct part_id from new_rows));
      elsif tg_op = 'DELETE' then
        perform notify_shelves(array(select distinct part_id from old_rows));
      elsif tg_op = 'UPDATE' then
        perform notify_shelves(array(select part_id from old_rows union select part_id from new_rows));
      else
        perform pg_notify('shelves', 'all');
      end if;
      return null;
    end $$;

CREATE FUNCTION public.notify_shelves(touched integer[]) RETURNS void
    LANGUAGE plpgsql
    AS $$
    begin
      if cardinality(touched) > 500 then perform pg_notify('shelves', 'all');
      elsif cardinality(touched) > 0 then perform pg_notify('shelves', array_to_string(touched, ','));
      end if;
    end $$;

CREATE FUNCTION public.parts_notify() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
    begin
      if tg_op = 'INSERT' then
        perform notify_shelves(array(select id from new_rows));
      elsif tg_op = 'DELETE' then
        perform notify_shelves(array(select id from old_rows));
      elsif tg_op = 'UPDATE' then
        perform notify_shelves(array(select id from old_rows union select id from new_rows));
      else
        perform pg_notify('shelves', 'all');
      end if;
      return null;
    end $$;

CREATE FUNCTION public.post_to_lot() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
    begin
      update lots set on_hand = on_hand + new.delta where id = new.lot_id returning on_hand into new.balance;
      return new;
    end $$;

CREATE FUNCTION public.refuse_change() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
    begin
      raise exception '% is append-only', tg_table_name using errcode = 'restrict_violation';
    end $$;

CREATE FUNCTION public.reserve_on_lot() RETURNS trigger
    LANGUAGE plpgsql
    AS $$
    declare
      before_qty int := 0;
      after_qty int := 0;
    begin
      if tg_op = 'UPDATE' and (new.lot_id <> old.lot_id or new.order_id <> old.order_id) then
        raise exception 'a reservation cannot move' using errcode = 'restrict_violation';
      end if;
      if tg_op <> 'INSERT' and old.state in ('held', 'allocated') then before_qty := old.quantity; end if;
      if tg_op <> 'DELETE' and new.state in ('held', 'allocated') then after_qty := new.quantity; end if;
      if before_qty <> after_qty then
        update lots set reserved = reserved + after_qty - before_qty
          where id = coalesce(new.lot_id, old.lot_id);
      end if;
      return null;
    end $$;

CREATE TABLE public.audit (
    id bigint NOT NULL,
    at timestamp with time zone DEFAULT now() NOT NULL,
    actor_id uuid,
    actor_name text NOT NULL,
    action text NOT NULL,
    subject_kind text NOT NULL,
    subject_id text NOT NULL,
    before jsonb,
    after jsonb,
    note text
);

ALTER TABLE public.audit ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.audit_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.basket_lines (
    id uuid DEFAULT gen_random_uuid() NOT NULL,
    basket_id uuid NOT NULL,
    token text NOT NULL,
    quantity integer NOT NULL,
    added_at timestamp with time zone DEFAULT now() NOT NULL,
    CONSTRAINT basket_lines_quantity_check CHECK (((quantity >= 1) AND (quantity <= 500)))
);

CREATE TABLE public.baskets (
    id uuid DEFAULT gen_random_uuid() NOT NULL,
    user_id uuid,
    guest_key_hash text,
    updated_at timestamp with time zone DEFAULT now() NOT NULL,
    CONSTRAINT baskets_one_keeper CHECK ((num_nonnulls(user_id, guest_key_hash) = 1))
);

CREATE TABLE public.bins (
    id integer NOT NULL,
    code text NOT NULL,
    walk_order integer NOT NULL,
    place text NOT NULL,
    CONSTRAINT bins_code_check CHECK ((code ~ '^[A-Z]-[0-9]{2}$'::text))
);

ALTER TABLE public.bins ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.bins_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.idempotency_keys (
    key text NOT NULL,
    scope text NOT NULL,
    request_hash text NOT NULL,
    status integer,
    body jsonb,
    created_at timestamp with time zone DEFAULT now() NOT NULL
);

CREATE TABLE public.knex_migrations (
    id integer NOT NULL,
    name character varying(255),
    batch integer,
    migration_time timestamp with time zone
);

CREATE SEQUENCE public.knex_migrations_id_seq
    AS integer
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1;

ALTER SEQUENCE public.knex_migrations_id_seq OWNED BY public.knex_migrations.id;

CREATE TABLE public.knex_migrations_lock (
    index integer NOT NULL,
    is_locked integer
);

CREATE SEQUENCE public.knex_migrations_lock_index_seq
    AS integer
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1;

ALTER SEQUENCE public.knex_migrations_lock_index_seq OWNED BY public.knex_migrations_lock.index;

CREATE TABLE public.lots (
    id integer NOT NULL,
    part_id integer NOT NULL,
    bin_id integer NOT NULL,
    code text NOT NULL,
    received_on date NOT NULL,
    on_hand integer DEFAULT 0 NOT NULL,
    reserved integer DEFAULT 0 NOT NULL,
    measured_mean double precision,
    measured_deviation double precision,
    measured_count integer,
    CONSTRAINT lots_measured_count_check CHECK ((measured_count > 0)),
    CONSTRAINT lots_measured_deviation_check CHECK ((measured_deviation >= (0)::double precision)),
    CONSTRAINT lots_measured_mean_check CHECK ((measured_mean > (0)::double precision)),
    CONSTRAINT lots_measured_whole CHECK ((num_nulls(measured_mean, measured_deviation, measured_count) = ANY (ARRAY[0, 3]))),
    CONSTRAINT lots_on_hand_check CHECK ((on_hand >= 0)),
    CONSTRAINT lots_reserved_check CHECK ((reserved >= 0)),
    CONSTRAINT lots_reserved_within_on_hand CHECK ((reserved <= on_hand))
);

ALTER TABLE public.lots ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.lots_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.mail_outbox (
    id bigint NOT NULL,
    message_key text NOT NULL,
    order_id bigint,
    recipient text NOT NULL,
    subject text NOT NULL,
    body_text text NOT NULL,
    body_html text NOT NULL,
    queued_at timestamp with time zone DEFAULT now() NOT NULL,
    sent_at timestamp with time zone,
    attempts integer DEFAULT 0 NOT NULL,
    last_error text
);

ALTER TABLE public.mail_outbox ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.mail_outbox_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.order_events (
    id bigint NOT NULL,
    order_id bigint NOT NULL,
    at timestamp with time zone NOT NULL,
    who text NOT NULL,
    what text NOT NULL,
    from_status text,
    to_status text
);

ALTER TABLE public.order_events ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.order_events_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.order_lines (
    id uuid DEFAULT gen_random_uuid() NOT NULL,
    order_id bigint NOT NULL,
    line_no integer NOT NULL,
    pack_id uuid NOT NULL,
    quantity integer NOT NULL,
    unit_gross_minor integer NOT NULL,
    line_gross_minor integer NOT NULL,
    line_tax_minor integer NOT NULL,
    CONSTRAINT order_lines_add_up CHECK ((line_gross_minor = (unit_gross_minor * quantity))),
    CONSTRAINT order_lines_check CHECK (((line_tax_minor >= 0) AND (line_tax_minor <= line_gross_minor))),
    CONSTRAINT order_lines_line_no_check CHECK ((line_no > 0)),
    CONSTRAINT order_lines_quantity_check CHECK (((quantity >= 1) AND (quantity <= 500))),
    CONSTRAINT order_lines_unit_gross_minor_check CHECK ((unit_gross_minor >= 0))
);

CREATE SEQUENCE public.order_number
    START WITH 1041
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1;

CREATE TABLE public.order_parts (
    id bigint NOT NULL,
    order_line_id uuid NOT NULL,
    role text NOT NULL,
    part_id integer NOT NULL,
    quantity integer NOT NULL,
    CONSTRAINT order_parts_quantity_check CHECK ((quantity > 0))
);

ALTER TABLE public.order_parts ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.order_parts_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.orders (
    id bigint NOT NULL,
    ref text NOT NULL,
    user_id uuid,
    basket_id uuid,
    email text NOT NULL,
    status text NOT NULL,
    ship_to jsonb NOT NULL,
    shipping_method text NOT NULL,
    shipping_name text NOT NULL,
    acknowledgements text[] DEFAULT '{}'::text[] NOT NULL,
    currency character(3) NOT NULL,
    goods_minor integer NOT NULL,
    shipping_minor integer NOT NULL,
    tax_basis_points integer NOT NULL,
    tax_minor integer NOT NULL,
    total_minor integer NOT NULL,
    reserved_until timestamp with time zone,
    ship_by timestamp with time zone,
    claimed_by uuid,
    claimed_at timestamp with time zone,
    placed_at timestamp with time zone NOT NULL,
    paid_at timestamp with time zone,
    CONSTRAINT orders_currency_check CHECK ((currency = 'EUR'::bpchar)),
    CONSTRAINT orders_goods_minor_check CHECK ((goods_minor >= 0)),
    CONSTRAINT orders_picking_is_claimed CHECK (((status <> 'picking'::text) OR (claimed_by IS NOT NULL))),
    CONSTRAINT orders_ref_check CHECK ((ref ~ '^TQ-[0-9]{4,}$'::text)),
    CONSTRAINT orders_shipping_minor_check CHECK ((shipping_minor >= 0)),
    CONSTRAINT orders_status_check CHECK ((status = ANY (ARRAY['awaiting_payment'::text, 'paid'::text, 'picking'::text, 'packed'::text, 'shipped'::text, 'on_hold'::text, 'cancelled'::text, 'refunded'::text]))),
    CONSTRAINT orders_tax_basis_points_check CHECK (((tax_basis_points >= 0) AND (tax_basis_points <= 5000))),
    CONSTRAINT orders_tax_minor_check CHECK ((tax_minor >= 0)),
    CONSTRAINT orders_tax_within_total CHECK ((tax_minor <= total_minor)),
    CONSTRAINT orders_total_adds_up CHECK ((total_minor = (goods_minor + shipping_minor))),
    CONSTRAINT orders_waiting_has_end CHECK (((status <> 'awaiting_payment'::text) OR (reserved_until IS NOT NULL)))
);

ALTER TABLE public.orders ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.orders_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.packs (
    id uuid DEFAULT gen_random_uuid() NOT NULL,
    identifier text NOT NULL,
    token text NOT NULL,
    topology text NOT NULL,
    sentence text NOT NULL,
    brief jsonb NOT NULL,
    parts jsonb NOT NULL,
    promise jsonb NOT NULL,
    cautions jsonb NOT NULL,
    strip jsonb NOT NULL,
    circuit jsonb NOT NULL,
    created_at timestamp with time zone DEFAULT now() NOT NULL,
    CONSTRAINT packs_topology_check CHECK ((topology = ANY (ARRAY['equal-thresholds'::text, 'shifted-thresholds'::text, 'steered'::text])))
);

CREATE TABLE public.parts (
    id integer NOT NULL,
    sku text NOT NULL,
    kind text NOT NULL,
    name text NOT NULL,
    mounting text NOT NULL,
    active boolean DEFAULT true NOT NULL,
    cost_minor integer NOT NULL,
    price_minor integer NOT NULL,
    currency character(3) DEFAULT 'EUR'::bpchar NOT NULL,
    grams numeric DEFAULT 0 NOT NULL,
    created_at timestamp with time zone DEFAULT now() NOT NULL,
    ohms double precision,
    tolerance double precision,
    temperature_coefficient_per_kelvin double precision,
    rated_watts double precision,
    farads double precision,
    dielectric text,
    rated_volts double precision,
    temperature_spread double precision,
    insulation_seconds double precision,
    leakage_amps double precision,
    bias_halving_volts double precision,
    polarised boolean,
    output text,
    sections integer,
    supply_min_volts double precision,
    supply_max_volts double precision,
    delay_low_high_seconds double precision,
    delay_high_low_seconds double precision,
    max_delay_seconds double precision,
    input_bias_amps double precision,
    max_input_bias_amps double precision,
    offset_volts double precision,
    max_offset_volts double precision,
    hysteresis_volts double precision,
    high_ohms double precision,
    low_ohms double precision,
    max_output_amps double precision,
    quiescent_amps double precision,
    max_quiescent_amps double precision,
    colour text,
    forward_volts double precision,
    min_forward_volts double precision,
    max_forward_volts double precision,
    max_amps double precision,
    saturation_amps double precision,
    emission_coefficient double precision,
    energy_gap_electron_volts double precision,
    saturation_temperature_exponent double precision,
    cell_size text,
    cells integer,
    nominal_volts double precision,
    fresh_volts double precision,
    empty_volts double precision,
    capacity_amp_hours double precision,
    CONSTRAINT parts_battery_complete CHECK (((kind <> 'battery'::text) OR (num_nulls(cell_size, cells, nominal_volts, fresh_volts, empty_volts, capacity_amp_hours) = 0))),
    CONSTRAINT parts_bias_halving_volts_check CHECK ((bias_halving_volts > (0)::double precision)),
    CONSTRAINT parts_board_complete CHECK (((kind <> 'board'::text) OR (sections IS NOT NULL))),
    CONSTRAINT parts_capacitor_complete CHECK (((kind <> 'capacitor'::text) OR (num_nulls(farads, tolerance, dielectric, rated_volts, temperature_coefficient_per_kelvin, temperature_spread, leakage_amps, polarised) = 0))),
    CONSTRAINT parts_capacity_amp_hours_check CHECK ((capacity_amp_hours > (0)::double precision)),
    CONSTRAINT parts_cell_size_check CHECK ((cell_size = ANY (ARRAY['AA'::text, 'AAA'::text]))),
    CONSTRAINT parts_cells_check CHECK (((cells >= 1) AND (cells <= 8))),
    CONSTRAINT parts_check CHECK ((supply_max_volts > supply_min_volts)),
    CONSTRAINT parts_check1 CHECK ((max_quiescent_amps >= quiescent_amps)),
    CONSTRAINT parts_check2 CHECK ((min_forward_volts <= forward_volts)),
    CONSTRAINT parts_check3 CHECK ((max_forward_volts >= forward_volts)),
    CONSTRAINT parts_check4 CHECK ((fresh_volts >= nominal_volts)),
    CONSTRAINT parts_check5 CHECK (((empty_volts > (0)::double precision) AND (empty_volts <= nominal_volts))),
    CONSTRAINT parts_colour_check CHECK ((colour = ANY (ARRAY['red'::text, 'orange'::text, 'yellow'::text, 'green'::text, 'blue'::text]))),
    CONSTRAINT parts_comparator_complete CHECK (((kind <> 'comparator'::text) OR (num_nulls(output, sections, supply_min_volts, supply_max_volts, delay_low_high_seconds, delay_high_low_seconds, max_delay_seconds, input_bias_amps, max_input_bias_amps, offset_volts, max_offset_volts, hysteresis_volts, high_ohms, low_ohms, max_output_amps, quiescent_amps, max_quiescent_amps) = 0))),
    CONSTRAINT parts_cost_minor_check CHECK ((cost_minor >= 0)),
    CONSTRAINT parts_currency_check CHECK ((currency = 'EUR'::bpchar)),
    CONSTRAINT parts_delay_high_low_seconds_check CHECK ((delay_high_low_seconds >= (0)::double precision)),
    CONSTRAINT parts_delay_low_high_seconds_check CHECK ((delay_low_high_seconds >= (0)::double precision)),
    CONSTRAINT parts_dielectric_check CHECK ((dielectric = ANY (ARRAY['C0G'::text, 'X7R'::text, 'film-pp'::text, 'film-pet'::text, 'electrolytic'::text]))),
    CONSTRAINT parts_diode_complete CHECK (((kind <> 'diode'::text) OR (num_nulls(saturation_amps, emission_coefficient, energy_gap_electron_volts, saturation_temperature_exponent) = 0))),
    CONSTRAINT parts_emission_coefficient_check CHECK ((emission_coefficient > (0)::double precision)),
    CONSTRAINT parts_energy_gap_electron_volts_check CHECK ((energy_gap_electron_volts > (0)::double precision)),
    CONSTRAINT parts_farads_check CHECK (((farads > (0)::double precision) AND (farads < (1)::double precision))),
    CONSTRAINT parts_forward_volts_check CHECK ((forward_volts > (0)::double precision)),
    CONSTRAINT parts_grams_check CHECK ((grams >= (0)::numeric)),
    CONSTRAINT parts_high_ohms_check CHECK ((high_ohms >= (0)::double precision)),
    CONSTRAINT parts_holder_complete CHECK (((kind <> 'holder'::text) OR (num_nulls(cell_size, cells) = 0))),
    CONSTRAINT parts_hysteresis_volts_check CHECK ((hysteresis_volts >= (0)::double precision)),
    CONSTRAINT parts_insulation_seconds_check CHECK ((insulation_seconds > (0)::double precision)),
    CONSTRAINT parts_kind_check CHECK ((kind = ANY (ARRAY['resistor'::text, 'capacitor'::text, 'comparator'::text, 'led'::text, 'diode'::text, 'board'::text, 'battery'::text, 'holder'::text, 'trimmer'::text]))),
    CONSTRAINT parts_leakage_amps_check CHECK ((leakage_amps >= (0)::double precision)),
    CONSTRAINT parts_led_complete CHECK (((kind <> 'led'::text) OR (num_nulls(colour, forward_volts, min_forward_volts, max_forward_volts, max_amps) = 0))),
    CONSTRAINT parts_low_ohms_check CHECK ((low_ohms >= (0)::double precision)),
    CONSTRAINT parts_max_amps_check CHECK ((max_amps > (0)::double precision)),
    CONSTRAINT parts_max_output_amps_check CHECK ((max_output_amps > (0)::double precision)),
    CONSTRAINT parts_mounting_check CHECK ((mounting = ANY (ARRAY['through-hole'::text, 'surface-mount'::text]))),
    CONSTRAINT parts_name_check CHECK ((name <> ''::text)),
    CONSTRAINT parts_nominal_volts_check CHECK ((nominal_volts > (0)::double precision)),
    CONSTRAINT parts_ohms_check CHECK (((ohms > (0)::double precision) AND (ohms < ('10000000000'::numeric)::double precision))),
    CONSTRAINT parts_output_check CHECK ((output = ANY (ARRAY['push-pull'::text, 'open-drain'::text]))),
    CONSTRAINT parts_price_minor_check CHECK ((price_minor >= 0)),
    CONSTRAINT parts_quiescent_amps_check CHECK ((quiescent_amps > (0)::double precision)),
    CONSTRAINT parts_rated_volts_check CHECK ((rated_volts > (0)::double precision)),
    CONSTRAINT parts_rated_watts_check CHECK ((rated_watts > (0)::double precision)),
    CONSTRAINT parts_resistor_complete CHECK (((kind <> ALL (ARRAY['resistor'::text, 'trimmer'::text])) OR (num_nulls(ohms, tolerance, temperature_coefficient_per_kelvin, rated_watts) = 0))),
    CONSTRAINT parts_saturation_amps_check CHECK ((saturation_amps > (0)::double precision)),
    CONSTRAINT parts_sections_check CHECK ((sections = ANY (ARRAY[1, 2, 4]))),
    CONSTRAINT parts_sku_check CHECK ((sku ~ '^[A-Z0-9][A-Z0-9-]{1,39}$'::text)),
    CONSTRAINT parts_supply_min_volts_check CHECK ((supply_min_volts > (0)::double precision)),
    CONSTRAINT parts_temperature_coefficient_per_kelvin_check CHECK ((abs(temperature_coefficient_per_kelvin) < (0.01)::double precision)),
    CONSTRAINT parts_temperature_spread_check CHECK (((temperature_spread >= (0)::double precision) AND (temperature_spread < (1)::double precision))),
    CONSTRAINT parts_tolerance_check CHECK (((tolerance > (0)::double precision) AND (tolerance < (1)::double precision)))
);

ALTER TABLE public.parts ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.parts_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.payment_events (
    id text NOT NULL,
    type text NOT NULL,
    payload jsonb NOT NULL,
    received_at timestamp with time zone DEFAULT now() NOT NULL,
    applied_at timestamp with time zone,
    outcome text
);

CREATE TABLE public.payments (
    id bigint NOT NULL,
    order_id bigint NOT NULL,
    session_id text NOT NULL,
    payment_url text NOT NULL,
    intent_id text,
    amount_minor integer NOT NULL,
    currency character(3) NOT NULL,
    status text NOT NULL,
    created_at timestamp with time zone DEFAULT now() NOT NULL,
    captured_at timestamp with time zone,
    CONSTRAINT payments_amount_minor_check CHECK ((amount_minor > 0)),
    CONSTRAINT payments_captured_has_intent CHECK (((status <> ALL (ARRAY['captured'::text, 'refunded'::text])) OR (intent_id IS NOT NULL))),
    CONSTRAINT payments_currency_check CHECK ((currency = 'EUR'::bpchar)),
    CONSTRAINT payments_status_check CHECK ((status = ANY (ARRAY['open'::text, 'captured'::text, 'expired'::text, 'refunded'::text])))
);

ALTER TABLE public.payments ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.payments_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.refunds (
    id bigint NOT NULL,
    payment_id bigint NOT NULL,
    refund_id text,
    request_key text NOT NULL,
    amount_minor integer NOT NULL,
    status text NOT NULL,
    reason text NOT NULL,
    actor_name text NOT NULL,
    created_at timestamp with time zone DEFAULT now() NOT NULL,
    CONSTRAINT refunds_amount_minor_check CHECK ((amount_minor > 0)),
    CONSTRAINT refunds_status_check CHECK ((status = ANY (ARRAY['asked'::text, 'done'::text, 'failed'::text])))
);

ALTER TABLE public.refunds ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.refunds_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.reservations (
    id bigint NOT NULL,
    order_id bigint NOT NULL,
    lot_id integer NOT NULL,
    quantity integer NOT NULL,
    picked integer DEFAULT 0 NOT NULL,
    state text NOT NULL,
    created_at timestamp with time zone DEFAULT now() NOT NULL,
    CONSTRAINT reservations_picked_within CHECK (((picked >= 0) AND (picked <= quantity))),
    CONSTRAINT reservations_quantity_check CHECK ((quantity > 0)),
    CONSTRAINT reservations_state_check CHECK ((state = ANY (ARRAY['held'::text, 'allocated'::text, 'released'::text, 'consumed'::text])))
);

ALTER TABLE public.reservations ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.reservations_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.sessions (
    id uuid DEFAULT gen_random_uuid() NOT NULL,
    user_id uuid NOT NULL,
    renewal_hash text NOT NULL,
    previous_renewal_hash text,
    renewed_at timestamp with time zone DEFAULT now() NOT NULL,
    created_at timestamp with time zone DEFAULT now() NOT NULL,
    expires_at timestamp with time zone NOT NULL,
    revoked_at timestamp with time zone,
    CONSTRAINT sessions_check CHECK ((expires_at > created_at))
);

CREATE TABLE public.settings (
    name text NOT NULL,
    value jsonb NOT NULL,
    changed_at timestamp with time zone DEFAULT now() NOT NULL
);

CREATE TABLE public.shipments (
    id bigint NOT NULL,
    order_id bigint NOT NULL,
    carrier text NOT NULL,
    tracking text NOT NULL,
    shipped_at timestamp with time zone NOT NULL,
    shipped_by uuid,
    CONSTRAINT shipments_carrier_check CHECK ((carrier <> ''::text)),
    CONSTRAINT shipments_tracking_check CHECK ((tracking <> ''::text))
);

ALTER TABLE public.shipments ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.shipments_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.shipping_methods (
    code text NOT NULL,
    zone text NOT NULL,
    name text NOT NULL,
    days text NOT NULL,
    net_minor integer NOT NULL,
    "position" integer NOT NULL,
    CONSTRAINT shipping_methods_net_minor_check CHECK ((net_minor >= 0)),
    CONSTRAINT shipping_methods_zone_check CHECK ((zone = ANY (ARRAY['home'::text, 'europe'::text, 'world'::text])))
);

CREATE TABLE public.shipping_zones (
    country character(2) NOT NULL,
    zone text NOT NULL,
    CONSTRAINT shipping_zones_zone_check CHECK ((zone = ANY (ARRAY['home'::text, 'europe'::text, 'world'::text])))
);

CREATE TABLE public.sign_in_failures (
    id bigint NOT NULL,
    email text NOT NULL,
    address text NOT NULL,
    at timestamp with time zone DEFAULT now() NOT NULL
);

ALTER TABLE public.sign_in_failures ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.sign_in_failures_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.stock_ledger (
    id bigint NOT NULL,
    lot_id integer NOT NULL,
    delta integer NOT NULL,
    balance integer NOT NULL,
    reason text NOT NULL,
    order_id bigint,
    actor_id uuid,
    actor_name text NOT NULL,
    note text,
    at timestamp with time zone DEFAULT now() NOT NULL,
    CONSTRAINT stock_ledger_balance_check CHECK ((balance >= 0)),
    CONSTRAINT stock_ledger_delta_check CHECK ((delta <> 0)),
    CONSTRAINT stock_ledger_reason_check CHECK ((reason = ANY (ARRAY['opening'::text, 'counted'::text, 'received'::text, 'damaged'::text, 'lost'::text, 'found'::text, 'returned'::text, 'shipped'::text]))),
    CONSTRAINT stock_ledger_shipment_has_order CHECK (((reason <> 'shipped'::text) OR ((order_id IS NOT NULL) AND (delta < 0))))
);

ALTER TABLE public.stock_ledger ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.stock_ledger_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.tax_rates (
    country character(2) NOT NULL,
    name text NOT NULL,
    basis_points integer NOT NULL,
    CONSTRAINT tax_rates_basis_points_check CHECK (((basis_points >= 0) AND (basis_points <= 5000)))
);

CREATE TABLE public.tunings (
    id bigint NOT NULL,
    order_line_id uuid NOT NULL,
    unit integer NOT NULL,
    farads double precision NOT NULL,
    meter_uncertainty double precision NOT NULL,
    first_part_id integer NOT NULL,
    second_part_id integer,
    joined text,
    promise jsonb NOT NULL,
    circuit jsonb NOT NULL,
    stands boolean DEFAULT true NOT NULL,
    tuned_by uuid,
    tuned_at timestamp with time zone NOT NULL,
    CONSTRAINT tunings_farads_check CHECK ((farads > (0)::double precision)),
    CONSTRAINT tunings_joined_check CHECK ((joined = ANY (ARRAY['series'::text, 'parallel'::text]))),
    CONSTRAINT tunings_meter_uncertainty_check CHECK ((meter_uncertainty >= (0)::double precision)),
    CONSTRAINT tunings_two_are_joined CHECK (((second_part_id IS NULL) = (joined IS NULL))),
    CONSTRAINT tunings_unit_check CHECK (((unit >= 1) AND (unit <= 500)))
);

ALTER TABLE public.tunings ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.tunings_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.unserved_briefs (
    id bigint NOT NULL,
    at timestamp with time zone DEFAULT now() NOT NULL,
    brief jsonb NOT NULL,
    nearest_error double precision
);

ALTER TABLE public.unserved_briefs ALTER COLUMN id ADD GENERATED ALWAYS AS IDENTITY (
    SEQUENCE NAME public.unserved_briefs_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1
);

CREATE TABLE public.users (
    id uuid DEFAULT gen_random_uuid() NOT NULL,
    email text NOT NULL,
    name text NOT NULL,
    role text DEFAULT 'customer'::text NOT NULL,
    password_hash text NOT NULL,
    created_at timestamp with time zone DEFAULT now() NOT NULL,
    deactivated_at timestamp with time zone,
    CONSTRAINT users_email_check CHECK (((email = lower(email)) AND (POSITION(('@'::text) IN (email)) > 1))),
    CONSTRAINT users_name_check CHECK ((name <> ''::text)),
    CONSTRAINT users_role_check CHECK ((role = ANY (ARRAY['customer'::text, 'packer'::text, 'owner'::text])))
);

ALTER TABLE ONLY public.knex_migrations ALTER COLUMN id SET DEFAULT nextval('public.knex_migrations_id_seq'::regclass);

ALTER TABLE ONLY public.knex_migrations_lock ALTER COLUMN index SET DEFAULT nextval('public.knex_migrations_lock_index_seq'::regclass);

ALTER TABLE ONLY public.audit
    ADD CONSTRAINT audit_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.basket_lines
    ADD CONSTRAINT basket_lines_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.basket_lines
    ADD CONSTRAINT basket_lines_token_once UNIQUE (basket_id, token);

ALTER TABLE ONLY public.baskets
    ADD CONSTRAINT baskets_guest_once UNIQUE (guest_key_hash);

ALTER TABLE ONLY public.baskets
    ADD CONSTRAINT baskets_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.baskets
    ADD CONSTRAINT baskets_user_once UNIQUE (user_id);

ALTER TABLE ONLY public.bins
    ADD CONSTRAINT bins_code_once UNIQUE (code);

ALTER TABLE ONLY public.bins
    ADD CONSTRAINT bins_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.bins
    ADD CONSTRAINT bins_walk_once UNIQUE (walk_order);

ALTER TABLE ONLY public.idempotency_keys
    ADD CONSTRAINT idempotency_keys_pkey PRIMARY KEY (scope, key);

ALTER TABLE ONLY public.knex_migrations_lock
    ADD CONSTRAINT knex_migrations_lock_pkey PRIMARY KEY (index);

ALTER TABLE ONLY public.knex_migrations
    ADD CONSTRAINT knex_migrations_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.lots
    ADD CONSTRAINT lots_code_once UNIQUE (part_id, code);

ALTER TABLE ONLY public.lots
    ADD CONSTRAINT lots_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.mail_outbox
    ADD CONSTRAINT mail_outbox_key_once UNIQUE (message_key);

ALTER TABLE ONLY public.mail_outbox
    ADD CONSTRAINT mail_outbox_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.order_events
    ADD CONSTRAINT order_events_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.order_lines
    ADD CONSTRAINT order_lines_number_once UNIQUE (order_id, line_no);

ALTER TABLE ONLY public.order_lines
    ADD CONSTRAINT order_lines_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.order_parts
    ADD CONSTRAINT order_parts_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.order_parts
    ADD CONSTRAINT order_parts_role_once UNIQUE (order_line_id, role);

ALTER TABLE ONLY public.orders
    ADD CONSTRAINT orders_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.orders
    ADD CONSTRAINT orders_ref_once UNIQUE (ref);

ALTER TABLE ONLY public.packs
    ADD CONSTRAINT packs_identifier_once UNIQUE (identifier);

ALTER TABLE ONLY public.packs
    ADD CONSTRAINT packs_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.parts
    ADD CONSTRAINT parts_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.parts
    ADD CONSTRAINT parts_sku_once UNIQUE (sku);

ALTER TABLE ONLY public.payment_events
    ADD CONSTRAINT payment_events_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.payments
    ADD CONSTRAINT payments_intent_once UNIQUE (intent_id);

ALTER TABLE ONLY public.payments
    ADD CONSTRAINT payments_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.payments
    ADD CONSTRAINT payments_session_once UNIQUE (session_id);

ALTER TABLE ONLY public.refunds
    ADD CONSTRAINT refunds_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.refunds
    ADD CONSTRAINT refunds_refund_once UNIQUE (refund_id);

ALTER TABLE ONLY public.refunds
    ADD CONSTRAINT refunds_request_once UNIQUE (request_key);

ALTER TABLE ONLY public.reservations
    ADD CONSTRAINT reservations_lot_once UNIQUE (order_id, lot_id);

ALTER TABLE ONLY public.reservations
    ADD CONSTRAINT reservations_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.sessions
    ADD CONSTRAINT sessions_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.sessions
    ADD CONSTRAINT sessions_renewal_once UNIQUE (renewal_hash);

ALTER TABLE ONLY public.settings
    ADD CONSTRAINT settings_pkey PRIMARY KEY (name);

ALTER TABLE ONLY public.shipments
    ADD CONSTRAINT shipments_order_once UNIQUE (order_id);

ALTER TABLE ONLY public.shipments
    ADD CONSTRAINT shipments_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.shipping_methods
    ADD CONSTRAINT shipping_methods_pkey PRIMARY KEY (code, zone);

ALTER TABLE ONLY public.shipping_zones
    ADD CONSTRAINT shipping_zones_pkey PRIMARY KEY (country);

ALTER TABLE ONLY public.sign_in_failures
    ADD CONSTRAINT sign_in_failures_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.stock_ledger
    ADD CONSTRAINT stock_ledger_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.tax_rates
    ADD CONSTRAINT tax_rates_pkey PRIMARY KEY (country);

ALTER TABLE ONLY public.tunings
    ADD CONSTRAINT tunings_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.tunings
    ADD CONSTRAINT tunings_unit_once UNIQUE (order_line_id, unit);

ALTER TABLE ONLY public.unserved_briefs
    ADD CONSTRAINT unserved_briefs_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.users
    ADD CONSTRAINT users_email_once UNIQUE (email);

ALTER TABLE ONLY public.users
    ADD CONSTRAINT users_pkey PRIMARY KEY (id);

CREATE INDEX audit_by_subject ON public.audit USING btree (subject_kind, subject_id, id);

CREATE INDEX lots_by_bin ON public.lots USING btree (bin_id);

CREATE INDEX lots_by_part ON public.lots USING btree (part_id, id);

CREATE INDEX mail_outbox_waiting ON public.mail_outbox USING btree (id) WHERE (sent_at IS NULL);

CREATE INDEX order_events_by_order ON public.order_events USING btree (order_id, id);

CREATE INDEX order_parts_by_part ON public.order_parts USING btree (part_id);

CREATE INDEX orders_by_placed ON public.orders USING btree (placed_at DESC);

CREATE INDEX orders_by_reservation_end ON public.orders USING btree (reserved_until) WHERE (status = 'awaiting_payment'::text);

CREATE INDEX orders_by_status ON public.orders USING btree (status, ship_by);

CREATE INDEX orders_by_user ON public.orders USING btree (user_id, placed_at DESC);

CREATE INDEX parts_by_kind ON public.parts USING btree (kind, active);

CREATE INDEX payments_by_order ON public.payments USING btree (order_id);

CREATE INDEX refunds_by_payment ON public.refunds USING btree (payment_id);

CREATE INDEX reservations_by_lot ON public.reservations USING btree (lot_id) WHERE (state = ANY (ARRAY['held'::text, 'allocated'::text]));

CREATE INDEX sessions_by_previous_renewal ON public.sessions USING btree (previous_renewal_hash);

CREATE INDEX sessions_by_user ON public.sessions USING btree (user_id);

CREATE INDEX sign_in_failures_by_address ON public.sign_in_failures USING btree (address, at);

CREATE INDEX sign_in_failures_by_email ON public.sign_in_failures USING btree (email, at);

CREATE INDEX stock_ledger_by_lot ON public.stock_ledger USING btree (lot_id, id);

CREATE INDEX stock_ledger_by_order ON public.stock_ledger USING btree (order_id) WHERE (order_id IS NOT NULL);

CREATE TRIGGER audit_append_only BEFORE DELETE OR UPDATE OR TRUNCATE ON public.audit FOR EACH STATEMENT EXECUTE FUNCTION public.refuse_change();

CREATE TRIGGER lots_guarded BEFORE INSERT OR UPDATE ON public.lots FOR EACH ROW EXECUTE FUNCTION public.lots_move_by_ledger_only();

CREATE TRIGGER lots_notify_delete AFTER DELETE ON public.lots REFERENCING OLD TABLE AS old_rows FOR EACH STATEMENT EXECUTE FUNCTION public.lots_notify();

CREATE TRIGGER lots_notify_insert AFTER INSERT ON public.lots REFERENCING NEW TABLE AS new_rows FOR EACH STATEMENT EXECUTE FUNCTION public.lots_notify();

CREATE TRIGGER lots_notify_truncate AFTER TRUNCATE ON public.lots FOR EACH STATEMENT EXECUTE FUNCTION public.lots_notify();

CREATE TRIGGER lots_notify_update AFTER UPDATE ON public.lots REFERENCING OLD TABLE AS old_rows NEW TABLE AS new_rows FOR EACH STATEMENT EXECUTE FUNCTION public.lots_notify();

CREATE TRIGGER order_events_append_only BEFORE DELETE OR UPDATE OR TRUNCATE ON public.order_events FOR EACH STATEMENT EXECUTE FUNCTION public.refuse_change();

CREATE TRIGGER packs_frozen BEFORE DELETE OR UPDATE OR TRUNCATE ON public.packs FOR EACH STATEMENT EXECUTE FUNCTION public.refuse_change();

CREATE TRIGGER parts_notify_delete AFTER DELETE ON public.parts REFERENCING OLD TABLE AS old_rows FOR EACH STATEMENT EXECUTE FUNCTION public.parts_notify();

CREATE TRIGGER parts_notify_insert AFTER INSERT ON public.parts REFERENCING NEW TABLE AS new_rows FOR EACH STATEMENT EXECUTE FUNCTION public.parts_notify();

CREATE TRIGGER parts_notify_truncate AFTER TRUNCATE ON public.parts FOR EACH STATEMENT EXECUTE FUNCTION public.parts_notify();

CREATE TRIGGER parts_notify_update AFTER UPDATE ON public.parts REFERENCING OLD TABLE AS old_rows NEW TABLE AS new_rows FOR EACH STATEMENT EXECUTE FUNCTION public.parts_notify();

CREATE TRIGGER reservations_reserve AFTER INSERT OR DELETE OR UPDATE ON public.reservations FOR EACH ROW EXECUTE FUNCTION public.reserve_on_lot();

CREATE TRIGGER stock_ledger_append_only BEFORE DELETE OR UPDATE OR TRUNCATE ON public.stock_ledger FOR EACH STATEMENT EXECUTE FUNCTION public.refuse_change();

CREATE TRIGGER stock_ledger_posts BEFORE INSERT ON public.stock_ledger FOR EACH ROW EXECUTE FUNCTION public.post_to_lot();

ALTER TABLE ONLY public.audit
    ADD CONSTRAINT audit_actor_id_fkey FOREIGN KEY (actor_id) REFERENCES public.users(id);

ALTER TABLE ONLY public.basket_lines
    ADD CONSTRAINT basket_lines_basket_id_fkey FOREIGN KEY (basket_id) REFERENCES public.baskets(id) ON DELETE CASCADE;

ALTER TABLE ONLY public.baskets
    ADD CONSTRAINT baskets_user_id_fkey FOREIGN KEY (user_id) REFERENCES public.users(id) ON DELETE CASCADE;

ALTER TABLE ONLY public.lots
    ADD CONSTRAINT lots_bin_id_fkey FOREIGN KEY (bin_id) REFERENCES public.bins(id);

ALTER TABLE ONLY public.lots
    ADD CONSTRAINT lots_part_id_fkey FOREIGN KEY (part_id) REFERENCES public.parts(id);

ALTER TABLE ONLY public.mail_outbox
    ADD CONSTRAINT mail_outbox_order_id_fkey FOREIGN KEY (order_id) REFERENCES public.orders(id);

ALTER TABLE ONLY public.order_events
    ADD CONSTRAINT order_events_order_id_fkey FOREIGN KEY (order_id) REFERENCES public.orders(id);

ALTER TABLE ONLY public.order_lines
    ADD CONSTRAINT order_lines_order_id_fkey FOREIGN KEY (order_id) REFERENCES public.orders(id);

ALTER TABLE ONLY public.order_lines
    ADD CONSTRAINT order_lines_pack_id_fkey FOREIGN KEY (pack_id) REFERENCES public.packs(id);

ALTER TABLE ONLY public.order_parts
    ADD CONSTRAINT order_parts_order_line_id_fkey FOREIGN KEY (order_line_id) REFERENCES public.order_lines(id);

ALTER TABLE ONLY public.order_parts
    ADD CONSTRAINT order_parts_part_id_fkey FOREIGN KEY (part_id) REFERENCES public.parts(id);

ALTER TABLE ONLY public.orders
    ADD CONSTRAINT orders_basket_id_fkey FOREIGN KEY (basket_id) REFERENCES public.baskets(id) ON DELETE SET NULL;

ALTER TABLE ONLY public.orders
    ADD CONSTRAINT orders_claimed_by_fkey FOREIGN KEY (claimed_by) REFERENCES public.users(id);

ALTER TABLE ONLY public.orders
    ADD CONSTRAINT orders_user_id_fkey FOREIGN KEY (user_id) REFERENCES public.users(id);

ALTER TABLE ONLY public.payments
    ADD CONSTRAINT payments_order_id_fkey FOREIGN KEY (order_id) REFERENCES public.orders(id);

ALTER TABLE ONLY public.refunds
    ADD CONSTRAINT refunds_payment_id_fkey FOREIGN KEY (payment_id) REFERENCES public.payments(id);

ALTER TABLE ONLY public.reservations
    ADD CONSTRAINT reservations_lot_id_fkey FOREIGN KEY (lot_id) REFERENCES public.lots(id);

ALTER TABLE ONLY public.reservations
    ADD CONSTRAINT reservations_order_id_fkey FOREIGN KEY (order_id) REFERENCES public.orders(id);

ALTER TABLE ONLY public.sessions
    ADD CONSTRAINT sessions_user_id_fkey FOREIGN KEY (user_id) REFERENCES public.users(id) ON DELETE CASCADE;

ALTER TABLE ONLY public.shipments
    ADD CONSTRAINT shipments_order_id_fkey FOREIGN KEY (order_id) REFERENCES public.orders(id);

ALTER TABLE ONLY public.shipments
    ADD CONSTRAINT shipments_shipped_by_fkey FOREIGN KEY (shipped_by) REFERENCES public.users(id);

ALTER TABLE ONLY public.shipping_zones
    ADD CONSTRAINT shipping_zones_country_fkey FOREIGN KEY (country) REFERENCES public.tax_rates(country);

ALTER TABLE ONLY public.stock_ledger
    ADD CONSTRAINT stock_ledger_actor_id_fkey FOREIGN KEY (actor_id) REFERENCES public.users(id);

ALTER TABLE ONLY public.stock_ledger
    ADD CONSTRAINT stock_ledger_lot_id_fkey FOREIGN KEY (lot_id) REFERENCES public.lots(id);

ALTER TABLE ONLY public.stock_ledger
    ADD CONSTRAINT stock_ledger_order_id_fkey FOREIGN KEY (order_id) REFERENCES public.orders(id);

ALTER TABLE ONLY public.tunings
    ADD CONSTRAINT tunings_first_part_id_fkey FOREIGN KEY (first_part_id) REFERENCES public.parts(id);

ALTER TABLE ONLY public.tunings
    ADD CONSTRAINT tunings_order_line_id_fkey FOREIGN KEY (order_line_id) REFERENCES public.order_lines(id);

ALTER TABLE ONLY public.tunings
    ADD CONSTRAINT tunings_second_part_id_fkey FOREIGN KEY (second_part_id) REFERENCES public.parts(id);

ALTER TABLE ONLY public.tunings
    ADD CONSTRAINT tunings_tuned_by_fkey FOREIGN KEY (tuned_by) REFERENCES public.users(id);
