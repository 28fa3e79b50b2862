-- The journal. entry numbers and seals every entry; one typed table a kind hangs
-- on its number. What people typed is TEXT, times are RFC 3339 with their offset;
-- a column that ends in _ms is the same time in milliseconds since 1970 UTC, for
-- order alone.

CREATE TABLE migration (
  version INTEGER PRIMARY KEY,
  name    TEXT NOT NULL,
  digest  TEXT NOT NULL -- SHA-256 of the file, hex
) STRICT;

CREATE TABLE entry (
  number      INTEGER PRIMARY KEY,
  recorded_at TEXT NOT NULL,
  operator    TEXT NOT NULL,
  kind        TEXT NOT NULL,
  digest      TEXT NOT NULL,
  chain       TEXT NOT NULL
) STRICT;
CREATE INDEX entry_operator ON entry (operator, number);

CREATE TABLE instrument (
  number    INTEGER PRIMARY KEY REFERENCES entry (number),
  id        TEXT NOT NULL UNIQUE,
  type      TEXT NOT NULL,
  scale     TEXT NOT NULL,
  basis     TEXT NOT NULL,
  division  TEXT NOT NULL,
  range_lo  TEXT NOT NULL,
  range_hi  TEXT NOT NULL,
  body      TEXT NOT NULL,
  read_at   TEXT NOT NULL,
  max_error TEXT NOT NULL,
  stem_mm   TEXT NOT NULL,
  mass_g    TEXT NOT NULL,
  tension   TEXT NOT NULL,
  note      TEXT NOT NULL,
  since     TEXT NOT NULL
) STRICT;

CREATE TABLE certificate (
  number     INTEGER PRIMARY KEY REFERENCES entry (number),
  instrument TEXT NOT NULL REFERENCES instrument (id),
  at         TEXT NOT NULL,
  at_ms      INTEGER NOT NULL,
  reference  TEXT NOT NULL
) STRICT;
CREATE INDEX certificate_order ON certificate (instrument, at_ms, number);

CREATE TABLE certificate_point (
  number     INTEGER NOT NULL REFERENCES certificate (number),
  place      INTEGER NOT NULL,
  reading    TEXT NOT NULL,
  correction TEXT NOT NULL,
  u          TEXT NOT NULL,
  PRIMARY KEY (number, place)
) STRICT;

CREATE TABLE instrument_check (
  number         INTEGER PRIMARY KEY REFERENCES entry (number),
  instrument     TEXT NOT NULL REFERENCES instrument (id),
  at             TEXT NOT NULL,
  at_ms          INTEGER NOT NULL,
  liquid         TEXT NOT NULL,
  strength       TEXT NOT NULL,
  found_text     TEXT NOT NULL,
  found_scale    TEXT NOT NULL,
  expected_text  TEXT NOT NULL,
  expected_scale TEXT NOT NULL,
  temp_text      TEXT NOT NULL,
  temp_unit      TEXT NOT NULL,
  correction     TEXT NOT NULL
) STRICT;
CREATE INDEX instrument_check_order ON instrument_check (instrument, at_ms, number);

CREATE TABLE retirement (
  number     INTEGER PRIMARY KEY REFERENCES entry (number),
  instrument TEXT NOT NULL REFERENCES instrument (id),
  at         TEXT NOT NULL,
  at_ms      INTEGER NOT NULL,
  reason     TEXT NOT NULL
) STRICT;
CREATE INDEX retirement_order ON retirement (instrument, at_ms, number);

CREATE TABLE batch (
  number     INTEGER PRIMARY KEY REFERENCES entry (number),
  id         TEXT NOT NULL UNIQUE,
  product    TEXT NOT NULL,
  vessel     TEXT NOT NULL,
  volume_l   TEXT NOT NULL,
  yeast      TEXT NOT NULL,
  generation INTEGER NOT NULL,
  parent     TEXT NOT NULL,
  pitched    TEXT, -- NULL when not known
  opened     TEXT NOT NULL,
  began_ms   INTEGER NOT NULL, -- of the pitch, else of the opening
  note       TEXT NOT NULL
) STRICT;
CREATE INDEX batch_order ON batch (product, began_ms, id);
CREATE INDEX batch_began ON batch (began_ms);

CREATE TABLE batch_og (
  number        INTEGER PRIMARY KEY REFERENCES entry (number),
  batch         TEXT NOT NULL REFERENCES batch (id),
  at            TEXT NOT NULL,
  at_ms         INTEGER NOT NULL,
  gravity_text  TEXT NOT NULL,
  gravity_scale TEXT NOT NULL,
  temp_text     TEXT NOT NULL,
  temp_unit     TEXT NOT NULL,
  instrument    TEXT NOT NULL
) STRICT;
CREATE INDEX batch_og_order ON batch_og (batch, at_ms, number);

CREATE TABLE batch_limit (
  number        INTEGER PRIMARY KEY REFERENCES entry (number),
  batch         TEXT NOT NULL REFERENCES batch (id),
  at            TEXT NOT NULL,
  at_ms         INTEGER NOT NULL,
  gravity_text  TEXT NOT NULL,
  gravity_scale TEXT NOT NULL
) STRICT;
CREATE INDEX batch_limit_order ON batch_limit (batch, at_ms, number);

CREATE TABLE batch_close (
  number INTEGER PRIMARY KEY REFERENCES entry (number),
  batch  TEXT NOT NULL REFERENCES batch (id),
  at     TEXT NOT NULL,
  at_ms  INTEGER NOT NULL,
  note   TEXT NOT NULL
) STRICT;
CREATE INDEX batch_close_order ON batch_close (batch, at_ms, number);

-- Most of the rows are here. Those of one batch lie together, with a copy of what
-- entry says, so that a batch is read in one go however many others ferment at the
-- same time.
CREATE TABLE reading (
  number        INTEGER NOT NULL UNIQUE REFERENCES entry (number),
  recorded_at   TEXT NOT NULL,
  operator      TEXT NOT NULL,
  batch         TEXT NOT NULL REFERENCES batch (id),
  vessel        TEXT NOT NULL,
  taken_at      TEXT NOT NULL,
  taken_ms      INTEGER NOT NULL,
  time_quality  TEXT NOT NULL,
  gravity_text  TEXT NOT NULL,
  gravity_scale TEXT NOT NULL,
  temp_text     TEXT NOT NULL,
  temp_unit     TEXT NOT NULL,
  instrument    TEXT NOT NULL,
  gassy         INTEGER NOT NULL,
  keep_reason   TEXT NOT NULL,
  note          TEXT NOT NULL,
  PRIMARY KEY (batch, taken_ms, number)
) STRICT, WITHOUT ROWID;

CREATE TABLE batch_event (
  number        INTEGER PRIMARY KEY REFERENCES entry (number),
  batch         TEXT NOT NULL REFERENCES batch (id),
  at            TEXT NOT NULL,
  at_ms         INTEGER NOT NULL,
  what          TEXT NOT NULL,
  mass_kg       TEXT NOT NULL,
  volume_l      TEXT NOT NULL,
  gravity_text  TEXT NOT NULL,
  gravity_scale TEXT NOT NULL,
  from_batch    TEXT NOT NULL,
  vessel        TEXT NOT NULL,
  note          TEXT NOT NULL
) STRICT;
CREATE INDEX batch_event_order ON batch_event (batch, at_ms, number);

CREATE TABLE void_entry (
  number INTEGER PRIMARY KEY REFERENCES entry (number),
  entry  INTEGER NOT NULL UNIQUE REFERENCES entry (number),
  reason TEXT NOT NULL
) STRICT;

-- Which batches are open follows from batch, batch_close and void_entry. This
-- table holds the answer, so that a look at the open ones does not grow with those
-- that are closed. It is outside the chain and can be made anew at any time.
CREATE TABLE open_batch (
  batch  TEXT PRIMARY KEY REFERENCES batch (id),
  vessel TEXT NOT NULL
) STRICT;
CREATE INDEX open_batch_order ON open_batch (vessel, batch);

-- Nothing is changed and nothing is deleted.
CREATE TRIGGER migration_no_update BEFORE UPDATE ON migration BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER migration_no_delete BEFORE DELETE ON migration BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER entry_no_update BEFORE UPDATE ON entry BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER entry_no_delete BEFORE DELETE ON entry BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER instrument_no_update BEFORE UPDATE ON instrument BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER instrument_no_delete BEFORE DELETE ON instrument BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER certificate_no_update BEFORE UPDATE ON certificate BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER certificate_no_delete BEFORE DELETE ON certificate BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER certificate_point_no_update BEFORE UPDATE ON certificate_point BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER certificate_point_no_delete BEFORE DELETE ON certificate_point BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER instrument_check_no_update BEFORE UPDATE ON instrument_check BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER instrument_check_no_delete BEFORE DELETE ON instrument_check BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER retirement_no_update BEFORE UPDATE ON retirement BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER retirement_no_delete BEFORE DELETE ON retirement BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER batch_no_update BEFORE UPDATE ON batch BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER batch_no_delete BEFORE DELETE ON batch BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER batch_og_no_update BEFORE UPDATE ON batch_og BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER batch_og_no_delete BEFORE DELETE ON batch_og BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER batch_limit_no_update BEFORE UPDATE ON batch_limit BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER batch_limit_no_delete BEFORE DELETE ON batch_limit BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER batch_close_no_update BEFORE UPDATE ON batch_close BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER batch_close_no_delete BEFORE DELETE ON batch_close BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER reading_no_update BEFORE UPDATE ON reading BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER reading_no_delete BEFORE DELETE ON reading BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER batch_event_no_update BEFORE UPDATE ON batch_event BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER batch_event_no_delete BEFORE DELETE ON batch_event BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER void_entry_no_update BEFORE UPDATE ON void_entry BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER void_entry_no_delete BEFORE DELETE ON void_entry BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
