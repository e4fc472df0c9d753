-- A scheduled run that was stopped before its end left no record of its own; that it was due and began is kept here.
CREATE TABLE interruption (
    id            INTEGER PRIMARY KEY AUTOINCREMENT,
    schedule      TEXT NOT NULL,
    scheduled_for TEXT NOT NULL,
    started       TEXT NOT NULL,
    interrupted   TEXT NOT NULL
) STRICT;

CREATE TRIGGER interruption_stays BEFORE DELETE ON interruption BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER interruption_holds BEFORE UPDATE ON interruption BEGIN SELECT RAISE (ABORT, 'append-only'); END;
