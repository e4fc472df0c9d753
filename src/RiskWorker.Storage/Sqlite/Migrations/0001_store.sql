-- Numbers that were typed are kept as the text that was typed; dates are ISO 8601 text; both read as they are with any SQLite tool.

CREATE TABLE feed_load (
    id        INTEGER PRIMARY KEY AUTOINCREMENT,
    loaded_at TEXT NOT NULL,
    folder    TEXT NOT NULL
) STRICT;

CREATE TABLE feed_file (
    file   TEXT PRIMARY KEY,
    sha256 TEXT NOT NULL,
    load   INTEGER NOT NULL REFERENCES feed_load (id)
) STRICT, WITHOUT ROWID;

CREATE TABLE feed_warning (
    code    TEXT NOT NULL,
    subject TEXT NOT NULL,
    message TEXT NOT NULL,
    PRIMARY KEY (subject, code)
) STRICT, WITHOUT ROWID;

CREATE TABLE book (
    book     TEXT PRIMARY KEY,
    parent   TEXT,
    name     TEXT,
    currency TEXT
) STRICT, WITHOUT ROWID;

CREATE TABLE factor (
    factor         TEXT PRIMARY KEY,
    class          TEXT NOT NULL,
    shock          TEXT NOT NULL,
    currency       TEXT,
    curve          TEXT,
    tenor_years    TEXT,
    calendar       TEXT,
    liquidity_days TEXT,
    proxy          TEXT,
    beta           TEXT
) STRICT, WITHOUT ROWID;

CREATE TABLE instrument (
    instrument   TEXT PRIMARY KEY,
    kind         TEXT NOT NULL,
    currency     TEXT NOT NULL,
    terms        TEXT NOT NULL,
    issuer       TEXT,
    lot          TEXT,
    daily_volume TEXT
) STRICT, WITHOUT ROWID;

CREATE TABLE risk_limit (
    "limit"        TEXT PRIMARY KEY,
    book           TEXT NOT NULL,
    measure        TEXT NOT NULL,
    confidence     TEXT NOT NULL,
    horizon_days   TEXT NOT NULL,
    amount         TEXT NOT NULL,
    basis          TEXT NOT NULL,
    reference_book TEXT,
    warn_at        TEXT NOT NULL,
    valid_from     TEXT,
    valid_to       TEXT,
    approver       TEXT,
    reason         TEXT
) STRICT, WITHOUT ROWID;

CREATE TABLE holiday (
    calendar TEXT NOT NULL,
    date     TEXT NOT NULL,
    PRIMARY KEY (calendar, date)
) STRICT, WITHOUT ROWID;

CREATE TABLE adjustment (
    factor TEXT NOT NULL,
    date   TEXT NOT NULL,
    ratio  TEXT NOT NULL,
    reason TEXT,
    PRIMARY KEY (factor, date)
) STRICT, WITHOUT ROWID;

CREATE TABLE covariance (
    factor TEXT NOT NULL,
    other  TEXT NOT NULL,
    value  TEXT NOT NULL,
    PRIMARY KEY (factor, other)
) STRICT, WITHOUT ROWID;

CREATE TABLE stress (
    scenario TEXT NOT NULL,
    target   TEXT NOT NULL,
    shock    TEXT NOT NULL,
    mode     TEXT,
    PRIMARY KEY (scenario, target)
) STRICT, WITHOUT ROWID;

CREATE TABLE observation (
    date   TEXT NOT NULL,
    factor TEXT NOT NULL,
    value  TEXT NOT NULL,
    PRIMARY KEY (date, factor)
) STRICT, WITHOUT ROWID;

CREATE TABLE observation_correction (
    id        INTEGER PRIMARY KEY AUTOINCREMENT,
    date      TEXT NOT NULL,
    factor    TEXT NOT NULL,
    old_value TEXT NOT NULL,
    new_value TEXT NOT NULL,
    load      INTEGER NOT NULL REFERENCES feed_load (id)
) STRICT;

CREATE INDEX observation_correction_by_key ON observation_correction (factor, date);

CREATE TABLE pnl (
    date         TEXT NOT NULL,
    book         TEXT NOT NULL,
    actual       TEXT,
    hypothetical TEXT,
    PRIMARY KEY (date, book)
) STRICT, WITHOUT ROWID;

CREATE TABLE pnl_correction (
    id               INTEGER PRIMARY KEY AUTOINCREMENT,
    date             TEXT NOT NULL,
    book             TEXT NOT NULL,
    old_actual       TEXT,
    new_actual       TEXT,
    old_hypothetical TEXT,
    new_hypothetical TEXT,
    load             INTEGER NOT NULL REFERENCES feed_load (id)
) STRICT;

CREATE INDEX pnl_correction_by_key ON pnl_correction (book, date);

-- The digest does not depend on the order of rows: it tells whether a date that is loaded again differs.
CREATE TABLE position_date (
    as_of  TEXT PRIMARY KEY,
    rows   INTEGER NOT NULL,
    digest TEXT NOT NULL
) STRICT, WITHOUT ROWID;

CREATE TABLE position (
    as_of        TEXT NOT NULL REFERENCES position_date (as_of),
    row          INTEGER NOT NULL,
    book         TEXT NOT NULL,
    instrument   TEXT NOT NULL,
    quantity     TEXT NOT NULL,
    trade        TEXT,
    market_value TEXT,
    PRIMARY KEY (as_of, row)
) STRICT, WITHOUT ROWID;

-- A run as it is kept for good. The columns beside the record repeat what queries need; an audit holds them against it.
CREATE TABLE run (
    sequence      INTEGER PRIMARY KEY AUTOINCREMENT,
    run           TEXT NOT NULL UNIQUE,
    attempt       INTEGER NOT NULL,
    as_of         TEXT NOT NULL,
    status        TEXT NOT NULL,
    evidence      TEXT NOT NULL,
    model         TEXT NOT NULL,
    scenarios     INTEGER,
    started       TEXT NOT NULL,
    finished      TEXT NOT NULL,
    snapshot      TEXT NOT NULL,
    settings_hash TEXT NOT NULL,
    figures       TEXT NOT NULL,
    version       TEXT NOT NULL,
    epoch         INTEGER NOT NULL,
    content       TEXT NOT NULL,
    profit_from   TEXT,
    seed          TEXT NOT NULL,
    breached      INTEGER NOT NULL,
    record        BLOB NOT NULL,
    UNIQUE (snapshot, attempt)
) STRICT;

CREATE INDEX run_by_date ON run (as_of, model, sequence);

CREATE TABLE run_var (
    run        TEXT NOT NULL REFERENCES run (run),
    book       TEXT NOT NULL,
    confidence TEXT NOT NULL,
    value      REAL NOT NULL,
    PRIMARY KEY (run, book, confidence)
) STRICT, WITHOUT ROWID;

CREATE TABLE run_profit (
    run    TEXT NOT NULL REFERENCES run (run),
    book   TEXT NOT NULL,
    amount REAL NOT NULL,
    PRIMARY KEY (run, book)
) STRICT, WITHOUT ROWID;

CREATE TABLE chain (
    sequence INTEGER PRIMARY KEY,
    kind     TEXT NOT NULL,
    run      TEXT NOT NULL REFERENCES run (run),
    content  TEXT NOT NULL,
    previous TEXT NOT NULL UNIQUE,
    hash     TEXT NOT NULL UNIQUE
) STRICT;

CREATE INDEX chain_by_run ON chain (run, sequence);

CREATE TABLE document (
    entry  INTEGER NOT NULL REFERENCES chain (sequence),
    name   TEXT NOT NULL,
    sha256 TEXT NOT NULL,
    PRIMARY KEY (entry, name)
) STRICT, WITHOUT ROWID;

CREATE TRIGGER observation_correction_stays BEFORE DELETE ON observation_correction BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER observation_correction_holds BEFORE UPDATE ON observation_correction BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER pnl_correction_stays BEFORE DELETE ON pnl_correction BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER pnl_correction_holds BEFORE UPDATE ON pnl_correction BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER feed_load_stays BEFORE DELETE ON feed_load BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER feed_load_holds BEFORE UPDATE ON feed_load BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER run_stays BEFORE DELETE ON run BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER run_holds BEFORE UPDATE ON run BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER run_var_stays BEFORE DELETE ON run_var BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER run_var_holds BEFORE UPDATE ON run_var BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER run_profit_stays BEFORE DELETE ON run_profit BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER run_profit_holds BEFORE UPDATE ON run_profit BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER chain_stays BEFORE DELETE ON chain BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER chain_holds BEFORE UPDATE ON chain BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER document_stays BEFORE DELETE ON document BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER document_holds BEFORE UPDATE ON document BEGIN SELECT RAISE (ABORT, 'append-only'); END;
