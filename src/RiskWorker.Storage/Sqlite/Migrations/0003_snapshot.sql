-- What each run read, kept so that it can be computed again. A part is one file of the feed, or one date of it, as canonical text (zlib):
-- it is stored once, by its hash, however many runs read it. A snapshot lists the parts at its paths; its key is the root of their hash tree,
-- which the run's record names.
CREATE TABLE snapshot_part (
    id      INTEGER PRIMARY KEY AUTOINCREMENT,
    hash    TEXT NOT NULL UNIQUE,
    content BLOB NOT NULL
) STRICT;

CREATE TABLE snapshot (
    root  TEXT PRIMARY KEY,
    parts BLOB NOT NULL
) STRICT, WITHOUT ROWID;

CREATE TRIGGER snapshot_part_stays BEFORE DELETE ON snapshot_part BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER snapshot_part_holds BEFORE UPDATE ON snapshot_part BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER snapshot_stays BEFORE DELETE ON snapshot BEGIN SELECT RAISE (ABORT, 'append-only'); END;
CREATE TRIGGER snapshot_holds BEFORE UPDATE ON snapshot BEGIN SELECT RAISE (ABORT, 'append-only'); END;
