-- Days of walk-forwards that are computed, so that one that was stopped goes on where it was: by the hash of everything that a day depends on.
CREATE TABLE walk_forward_day (
    key     TEXT PRIMARY KEY,
    content BLOB NOT NULL
) STRICT, WITHOUT ROWID;

-- What is written to explain an exception. A correction is a later row: nothing is changed.
CREATE TABLE exception_explanation (
    id      INTEGER PRIMARY KEY AUTOINCREMENT,
    date    TEXT NOT NULL,
    book    TEXT NOT NULL,
    cause   TEXT NOT NULL,
    text    TEXT NOT NULL,
    author  TEXT NOT NULL,
    written TEXT NOT NULL
) STRICT;

CREATE TRIGGER exception_explanation_stays BEFORE DELETE ON exception_explanation BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER exception_explanation_holds BEFORE UPDATE ON exception_explanation BEGIN SELECT RAISE (ABORT, 'append-only'); END;
