-- What people have logged of instruments: not to be believed for a time, or set right. A signal's home line keeps it.
CREATE TABLE instrument_event (
    line_id      integer     NOT NULL,
    signal_id    integer     NOT NULL,
    event_id     uuid        NOT NULL,
    kind         text        NOT NULL,
    starts_at    timestamptz NOT NULL,
    ends_at      timestamptz,
    note         text        NOT NULL,
    logged_at    timestamptz NOT NULL,
    request_key  text        NOT NULL,
    withdrawn_at timestamptz,
    PRIMARY KEY (line_id, signal_id, event_id),
    UNIQUE (line_id, signal_id, request_key)
);
COMMENT ON COLUMN instrument_event.kind IS 'instrument-excluded (an interval) or recalibration (an instant).';

-- What the other instruments wanted to add to each reading, by the hour: arrays beside each other, SI units.
CREATE TABLE balance_hour (
    line_id     integer            NOT NULL,
    hour        timestamptz        NOT NULL,
    revision_id integer            NOT NULL,
    signal      text[]             NOT NULL,
    n           smallint[]         NOT NULL,
    difference  real[]             NOT NULL,
    PRIMARY KEY (line_id, hour, revision_id)
);

ALTER TABLE effect_window
    ADD COLUMN head_corrected_driving_force_k double precision,
    ADD COLUMN head_corrected_driving_force_u double precision;

-- What an effect did, as stretches of windows that are alike; none crosses an hour, so that a day has the same ones however it came.
CREATE TABLE effect_stretch (
    line_id     integer     NOT NULL,
    effect_id   integer     NOT NULL,
    starts_at   timestamptz NOT NULL,
    revision_id integer     NOT NULL,
    ends_at     timestamptz NOT NULL,
    state       smallint    NOT NULL,
    product     text,
    bodies      text,
    PRIMARY KEY (line_id, effect_id, starts_at, revision_id)
);
COMMENT ON COLUMN effect_stretch.bodies IS 'Bodies in service, joined by +; empty for the own surface of the effect; null when not known.';
