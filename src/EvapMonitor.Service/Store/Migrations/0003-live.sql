-- An evaluation takes a day's mark before it reads, so that what comes meanwhile marks it anew; a killed one leaves what it took for the next.
ALTER TABLE line_day ADD COLUMN taken_from timestamptz, ADD COLUMN result_version bigint NOT NULL DEFAULT 0;
COMMENT ON COLUMN line_day.data_version IS 'Grows with every change of what the day rests on.';
COMMENT ON COLUMN line_day.result_version IS 'Grows with every write of its results.';
DROP INDEX line_day_waiting;
CREATE INDEX line_day_waiting ON line_day (line_id, day) WHERE changed_from IS NOT NULL OR taken_from IS NOT NULL;

-- Who evaluates a line, on the database's clock. The fence grows with each new owner; results of an owner who lost the lease are refused.
CREATE TABLE line_lease (
    line_id integer     PRIMARY KEY,
    owner   uuid        NOT NULL,
    fence   bigint      NOT NULL,
    until   timestamptz NOT NULL
);
