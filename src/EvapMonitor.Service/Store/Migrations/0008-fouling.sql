-- A cleaning may be that of a body; and people may say that what was recognised was none.
ALTER TABLE cleaning ADD COLUMN body text, ADD COLUMN rejected boolean NOT NULL DEFAULT false;
COMMENT ON COLUMN cleaning.rejected IS 'True: no cleaning in this time, whatever was recognised.';

-- What the hours of a line tell of its surfaces, derived from results and log: computed anew as a whole, written where it changed.
CREATE TABLE surface_state (
    line_id     integer     NOT NULL PRIMARY KEY,
    input       text        NOT NULL,
    computed_at timestamptz NOT NULL,
    version     bigint      NOT NULL
);
COMMENT ON COLUMN surface_state.input IS 'Versions of what it was computed from: the same text, the same surfaces.';

CREATE TABLE surface_history (
    line_id integer NOT NULL,
    surface text    NOT NULL,
    place   integer NOT NULL,
    effect  text    NOT NULL,
    served_until timestamptz NOT NULL,
    body    text    NOT NULL,
    PRIMARY KEY (line_id, surface)
);
COMMENT ON COLUMN surface_history.body IS 'Campaigns, cleanings, stops, clean expectations, tests on water, as JSON.';

CREATE TABLE clean_hour (
    line_id      integer          NOT NULL,
    effect_id    integer          NOT NULL,
    hour         timestamptz      NOT NULL,
    surface      text             NOT NULL,
    campaign     integer          NOT NULL,
    reference    integer          NOT NULL,
    clean        double precision,
    clean_u      double precision,
    cleanliness  double precision,
    cleanliness_u double precision,
    resistance   double precision,
    resistance_u double precision,
    at_reference double precision,
    at_reference_u double precision,
    clamped      boolean          NOT NULL,
    PRIMARY KEY (line_id, effect_id, hour)
);
COMMENT ON TABLE clean_hour IS 'How clean a surface was in each hour of production. Uncertainties are random parts. campaign and reference are places in surface_history.';
