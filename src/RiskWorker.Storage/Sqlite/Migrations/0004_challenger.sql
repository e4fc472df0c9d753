-- One-day VaR of the models that ran beside the one of record: what their exceptions are counted from.
CREATE TABLE run_challenger_var (
    run        TEXT NOT NULL REFERENCES run (run),
    model      TEXT NOT NULL,
    book       TEXT NOT NULL,
    confidence TEXT NOT NULL,
    value      REAL NOT NULL,
    PRIMARY KEY (run, model, book, confidence)
) STRICT, WITHOUT ROWID;

CREATE TRIGGER run_challenger_var_stays BEFORE DELETE ON run_challenger_var BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER run_challenger_var_holds BEFORE UPDATE ON run_challenger_var BEGIN SELECT RAISE (ABORT, 'append-only'); END;
