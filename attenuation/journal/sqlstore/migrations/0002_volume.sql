-- The volume of a batch, entered after it was opened; and the way from a batch to
-- those that it was blended into.

CREATE TABLE batch_volume (
  number   INTEGER PRIMARY KEY REFERENCES entry (number),
  batch    TEXT NOT NULL REFERENCES batch (id),
  at       TEXT NOT NULL,
  at_ms    INTEGER NOT NULL,
  volume_l TEXT NOT NULL
) STRICT;
CREATE INDEX batch_volume_order ON batch_volume (batch, at_ms, number);
CREATE INDEX batch_event_from ON batch_event (from_batch, at_ms, number) WHERE from_batch <> '';

CREATE TRIGGER batch_volume_no_update BEFORE UPDATE ON batch_volume BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
CREATE TRIGGER batch_volume_no_delete BEFORE DELETE ON batch_volume BEGIN SELECT RAISE(ABORT, 'the journal is append-only'); END;
