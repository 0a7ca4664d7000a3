-- Readings that the database would not take, for people to look at. A small reference table: the program keeps the last ten thousand.
CREATE TABLE refused_reading (
    refused_id bigint GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
    refused_at timestamptz      NOT NULL DEFAULT clock_timestamp(),
    signal     text             NOT NULL,
    at         timestamptz      NOT NULL,
    value      double precision,
    quality    smallint         NOT NULL,
    source     text             NOT NULL,
    reason     text             NOT NULL,
    UNIQUE (signal, at, source)
);
