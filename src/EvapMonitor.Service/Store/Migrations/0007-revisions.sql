-- Revisions in time. What was accepted before this held for all time, the last one alone: all of them start where the first does, and of those with one start the
-- one accepted last is in force.
UPDATE plant_revision SET in_force_from = (SELECT in_force_from FROM plant_revision ORDER BY revision_id LIMIT 1);
ALTER TABLE plant_revision ADD COLUMN request_key text UNIQUE, ADD COLUMN given integer;
COMMENT ON COLUMN plant_revision.given IS 'Grows with each start of the program with this file; null: never. A file unchanged since the last start undoes nothing that came since.';
UPDATE plant_revision SET given = revision_id;

-- Under which names a revision knows the lines and effects: a later rename must not part an earlier revision from its history.
CREATE TABLE revision_line (
    line_id     integer   NOT NULL,
    revision_id integer   NOT NULL,
    name        text      NOT NULL,
    effect      text[]    NOT NULL,
    effect_id   integer[] NOT NULL,
    PRIMARY KEY (line_id, revision_id)
);

-- Days computed anew though no reading changed: a revision was accepted, the computation is a newer one, a person asked.
CREATE TABLE recomputation (
    recomputation_id integer GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
    cause            text        NOT NULL,
    revision_id      integer,
    model            smallint,
    line_id          integer,
    first_day        date        NOT NULL,
    last_day         date        NOT NULL,
    days_total       integer     NOT NULL,
    author           text        NOT NULL,
    state            text        NOT NULL,
    started_at       timestamptz NOT NULL,
    ended_at         timestamptz
);
CREATE TABLE recomputation_day (
    line_id          integer NOT NULL,
    day              date    NOT NULL,
    recomputation_id integer NOT NULL,
    PRIMARY KEY (line_id, day, recomputation_id)
);
CREATE INDEX recomputation_day_of ON recomputation_day (recomputation_id);
COMMENT ON TABLE recomputation_day IS 'Days of a recomputation that have not been computed yet: a day leaves when its new results are written.';

ALTER TABLE line_day ADD COLUMN anew boolean NOT NULL DEFAULT false, ADD COLUMN superseded_at timestamptz;
COMMENT ON COLUMN line_day.anew IS 'The day waits to be computed anew as a whole though none of its readings changed.';
COMMENT ON COLUMN line_day.superseded_at IS 'Since when windows of another revision stand beside those shown; null when none do.';
DROP INDEX line_day_waiting;
CREATE INDEX line_day_waiting ON line_day (line_id, day) WHERE changed_from IS NOT NULL OR taken_from IS NOT NULL OR anew;
CREATE INDEX line_day_superseded ON line_day (superseded_at) WHERE superseded_at IS NOT NULL;
-- Of results computed under earlier revisions it is not known since when they are superseded: from today on.
UPDATE line_day d SET superseded_at = clock_timestamp()
WHERE EXISTS (SELECT 1 FROM line_window w WHERE w.line_id = d.line_id AND w.at >= d.day::timestamp AT TIME ZONE 'UTC'
    AND w.at < (d.day + 1)::timestamp AT TIME ZONE 'UTC' AND w.revision_id <> d.shown_revision);

-- Lines are written beside each other now: two may need the same month at the same time.
CREATE OR REPLACE FUNCTION ensure_month(parent text, instant timestamptz) RETURNS void LANGUAGE plpgsql AS $$
DECLARE
    first_day date := date_trunc('month', instant AT TIME ZONE 'UTC')::date;
    child     text := format('%s_%s', parent, to_char(first_day, 'YYYYMM'));
BEGIN
    IF to_regclass(child) IS NULL THEN
        EXECUTE format('CREATE TABLE IF NOT EXISTS %I PARTITION OF %I FOR VALUES FROM (%L) TO (%L)',
            child, parent, first_day::text || ' 00:00+00', (first_day + interval '1 month')::date::text || ' 00:00+00');
    END IF;
EXCEPTION
    WHEN duplicate_table OR unique_violation THEN
        NULL;
END $$;
