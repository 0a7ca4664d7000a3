-- Reference tables.
CREATE TABLE plant_revision (
    revision_id   integer GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
    accepted_at   timestamptz NOT NULL,
    in_force_from timestamptz NOT NULL,
    author        text        NOT NULL,
    body          text        NOT NULL,
    sha256        text        NOT NULL
);

CREATE TABLE line (
    line_id integer GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
    name    text NOT NULL UNIQUE
);

CREATE TABLE effect (
    line_id   integer NOT NULL,
    effect_id integer NOT NULL,
    name      text    NOT NULL,
    PRIMARY KEY (line_id, effect_id),
    UNIQUE (line_id, name)
);

CREATE TABLE signal (
    signal_id    integer GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
    name         text    NOT NULL UNIQUE,
    home_line_id integer NOT NULL
);

-- One row for each file, known by its content.
CREATE TABLE import_file (
    sha256           text        PRIMARY KEY,
    name             text        NOT NULL,
    stored_as        text,
    state            text        NOT NULL,
    replace_existing boolean     NOT NULL DEFAULT false,
    bytes_total      bigint      NOT NULL,
    bytes_read       bigint      NOT NULL DEFAULT 0,
    committed_offset bigint      NOT NULL DEFAULT 0,
    accepted         bigint      NOT NULL DEFAULT 0,
    repeated         bigint      NOT NULL DEFAULT 0,
    differing        bigint      NOT NULL DEFAULT 0,
    rejected         bigint      NOT NULL DEFAULT 0,
    not_in_plant     bigint      NOT NULL DEFAULT 0,
    received_at      timestamptz NOT NULL,
    started_at       timestamptz,
    ended_at         timestamptz,
    error            text,
    problems         jsonb       NOT NULL DEFAULT '[]',
    unknown_signals  jsonb       NOT NULL DEFAULT '[]'
);
COMMENT ON COLUMN import_file.committed_offset IS 'Rows of the file whose readings are in the database: committed together with them.';

-- Readings as received, in the plant's unit. Verdicts belong to a plant revision and are recomputed, never stored.
CREATE TABLE reading (
    line_id   integer          NOT NULL,
    signal_id integer          NOT NULL,
    at        timestamptz      NOT NULL,
    value     double precision,
    quality   smallint         NOT NULL,
    PRIMARY KEY (line_id, signal_id, at)
);

-- The one trigger: a transaction that inserts readings marks the day; the evaluation clears the mark.
CREATE TABLE line_day (
    line_id           integer     NOT NULL,
    day               date        NOT NULL,
    data_version      bigint      NOT NULL,
    changed_from      timestamptz,
    changed_at        timestamptz NOT NULL,
    evaluated_through timestamptz,
    shown_revision    integer,
    PRIMARY KEY (line_id, day)
);
CREATE INDEX line_day_waiting ON line_day (line_id, day) WHERE changed_from IS NOT NULL;

-- Results. A new revision's results stand beside the old ones; line_day.shown_revision says which are shown.
CREATE TABLE effect_window (
    line_id                integer     NOT NULL,
    effect_id              integer     NOT NULL,
    at                     timestamptz NOT NULL,
    revision_id            integer     NOT NULL,
    model                  smallint    NOT NULL,
    state                  smallint    NOT NULL,
    heating_temperature_k  double precision,
    heating_temperature_u  double precision,
    boiling_temperature_k  double precision,
    boiling_temperature_u  double precision,
    elevation_k            double precision,
    elevation_u            double precision,
    driving_force_k        double precision,
    driving_force_u        double precision,
    duty_w                 double precision,
    duty_u                 double precision,
    coefficient_w_m2k      double precision,
    coefficient_systematic double precision,
    coefficient_random     double precision,
    solids                 double precision,
    heating_from           smallint    NOT NULL,
    boiling_from           smallint    NOT NULL,
    duty_from              smallint    NOT NULL,
    extrapolated           boolean     NOT NULL,
    reason                 text,
    PRIMARY KEY (line_id, effect_id, at, revision_id)
) PARTITION BY RANGE (at);

CREATE TABLE line_window (
    line_id          integer     NOT NULL,
    at               timestamptz NOT NULL,
    revision_id      integer     NOT NULL,
    state            smallint    NOT NULL,
    evaporation_kg_s double precision,
    PRIMARY KEY (line_id, at, revision_id)
) PARTITION BY RANGE (at);

CREATE TABLE effect_hour (
    line_id     integer          NOT NULL,
    effect_id   integer          NOT NULL,
    quantity    smallint         NOT NULL,
    hour        timestamptz      NOT NULL,
    revision_id integer          NOT NULL,
    n           integer          NOT NULL,
    mean        double precision NOT NULL,
    lowest      double precision NOT NULL,
    highest     double precision NOT NULL,
    median      double precision NOT NULL,
    systematic  double precision NOT NULL,
    random      double precision NOT NULL,
    PRIMARY KEY (line_id, effect_id, quantity, hour, revision_id)
);

CREATE TABLE cleaning (
    line_id     integer     NOT NULL,
    effect_id   integer     NOT NULL,
    cleaning_id uuid        NOT NULL,
    starts_at   timestamptz NOT NULL,
    ends_at     timestamptz,
    kind        text        NOT NULL,
    note        text        NOT NULL,
    logged_at   timestamptz NOT NULL,
    request_key text        NOT NULL,
    withdrawn_at timestamptz,
    PRIMARY KEY (line_id, effect_id, cleaning_id),
    UNIQUE (line_id, effect_id, request_key)
);

-- Partitions of one month, made when first needed.
CREATE FUNCTION ensure_month(parent text, instant timestamptz) RETURNS void LANGUAGE plpgsql AS $$
DECLARE
    first_day date := date_trunc('month', instant AT TIME ZONE 'UTC')::date;
    child     text := format('%s_%s', parent, to_char(first_day, 'YYYYMM'));
BEGIN
    IF to_regclass(child) IS NULL THEN
        EXECUTE format('CREATE TABLE IF NOT EXISTS %I PARTITION OF %I FOR VALUES FROM (%L) TO (%L)',
            child, parent, first_day::text || ' 00:00+00', (first_day + interval '1 month')::date::text || ' 00:00+00');
    END IF;
END $$;
