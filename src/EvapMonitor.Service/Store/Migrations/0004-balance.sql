-- What the arrays of a balance belong to. The same for all windows of a revision and liquor, told apart by its content.
CREATE TABLE balance_layout (
    line_id     integer    NOT NULL,
    revision_id integer    NOT NULL,
    layout      bigint     NOT NULL,
    variable    text[]     NOT NULL,
    unit        text[]     NOT NULL,
    instruments smallint[] NOT NULL,
    signal      text[]     NOT NULL,
    PRIMARY KEY (line_id, revision_id, layout)
);
COMMENT ON COLUMN balance_layout.unit IS 'SI units of measured, reconciled and standard.';
COMMENT ON COLUMN balance_layout.instruments IS 'By variable, positions in signal (from 0) of the instruments that measure it; each list ends with -1.';

-- The reconciled balance of a window: arrays beside the layout, NaN is absent. Never a row for each variable.
-- Seven figures are more than any of these numbers has, and a third less on disk.
CREATE TABLE balance_window (
    line_id     integer            NOT NULL,
    at          timestamptz        NOT NULL,
    revision_id integer            NOT NULL,
    layout      bigint             NOT NULL,
    measured    real[]             NOT NULL,
    reconciled  real[]             NOT NULL,
    standard    real[]             NOT NULL,
    class       bytea              NOT NULL,
    correction  real[]             NOT NULL,
    wanted      real[]             NOT NULL,
    test        real[]             NOT NULL,
    chi2        double precision   NOT NULL,
    degrees     smallint           NOT NULL,
    suspect     smallint[]         NOT NULL,
    left_out    smallint[]         NOT NULL,
    PRIMARY KEY (line_id, at, revision_id)
) PARTITION BY RANGE (at);
COMMENT ON COLUMN balance_window.correction IS 'By signal, in standard uncertainties of its reading; wanted is the same in its SI unit.';
COMMENT ON COLUMN balance_window.suspect IS 'Sets of signals of which one is wrong, as positions from 0; each set ends with -1.';

-- By which computation a day was evaluated: an older one is done again in the background.
ALTER TABLE line_day ADD COLUMN model smallint NOT NULL DEFAULT 0;
