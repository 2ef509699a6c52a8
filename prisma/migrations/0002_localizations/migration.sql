-- Localizations: the computed answers of an event that somebody chose to keep, numbered from 1 as they were saved.
-- Each holds a copy of all that made it, so that it can be made again whatever becomes of its event; none is changed.

CREATE TABLE localizations (
  id INTEGER NOT NULL PRIMARY KEY AUTOINCREMENT,
  event_id TEXT NOT NULL,
  number INTEGER NOT NULL CHECK (number >= 1),
  saved_epoch_seconds REAL NOT NULL,
  actor TEXT NOT NULL CHECK (length(actor) > 0),
  reason TEXT NOT NULL,
  program TEXT NOT NULL CHECK (length(program) > 0),
  node_version TEXT NOT NULL CHECK (length(node_version) > 0),
  input_digest TEXT NOT NULL CHECK (length(input_digest) = 64),
  settings_json TEXT NOT NULL CHECK (json_type(settings_json) = 'object'),
  input_json TEXT NOT NULL CHECK (json_type(input_json) = 'object'),
  left_out_json TEXT NOT NULL CHECK (json_type(left_out_json) = 'array'),
  answer_json TEXT NOT NULL CHECK (json_type(answer_json) = 'object'),
  outcome TEXT NOT NULL CHECK (outcome IN ('located', 'several', 'ring-only', 'too-few', 'no-agreement')),
  latitude_degrees REAL CHECK (latitude_degrees BETWEEN -90 AND 90),
  longitude_degrees REAL CHECK (longitude_degrees BETWEEN -180 AND 180),
  origin_epoch_seconds REAL,
  CHECK ((latitude_degrees IS NULL) = (longitude_degrees IS NULL)),
  CHECK ((latitude_degrees IS NULL) = (origin_epoch_seconds IS NULL)),
  UNIQUE (event_id, number),
  FOREIGN KEY (event_id) REFERENCES events (id) ON DELETE RESTRICT ON UPDATE RESTRICT
) STRICT;

CREATE TRIGGER localizations_are_not_changed BEFORE UPDATE ON localizations
BEGIN
  SELECT RAISE(ABORT, 'A localization is kept as it was saved.');
END;

CREATE TRIGGER localizations_are_not_removed BEFORE DELETE ON localizations
BEGIN
  SELECT RAISE(ABORT, 'A localization is kept as it was saved.');
END;
