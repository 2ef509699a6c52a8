-- What is known of stations beside their deployments; arrivals as things of their own, which an event gathers and which
-- can be moved between events; quality flags of readings; revisions, by which a stale edit is told.
-- Ids grow in the order in which rows were brought in, and observations are read in that order.

CREATE TABLE groups (
  id TEXT NOT NULL PRIMARY KEY CHECK (length(id) > 0),
  name TEXT NOT NULL CHECK (length(name) > 0)
) STRICT;

INSERT INTO groups (id, name) VALUES ('local', 'This group');

ALTER TABLE stations ADD COLUMN revision INTEGER NOT NULL DEFAULT 1 CHECK (revision >= 1);
ALTER TABLE stations ADD COLUMN group_id TEXT NOT NULL DEFAULT 'local' REFERENCES groups (id) ON DELETE RESTRICT ON UPDATE RESTRICT;
ALTER TABLE stations ADD COLUMN licence TEXT CHECK (length(licence) > 0);
ALTER TABLE stations ADD COLUMN attribution TEXT CHECK (length(attribution) > 0);
ALTER TABLE stations ADD COLUMN contact TEXT CHECK (length(contact) > 0);
ALTER TABLE stations ADD COLUMN doi TEXT CHECK (length(doi) > 0);
ALTER TABLE stations ADD COLUMN visibility TEXT NOT NULL DEFAULT 'group' CHECK (visibility IN ('group', 'pool', 'public'));
ALTER TABLE stations ADD COLUMN embargo_until_epoch_seconds REAL;
ALTER TABLE stations ADD COLUMN note TEXT NOT NULL DEFAULT '';

CREATE TABLE station_aliases (
  station_id TEXT NOT NULL,
  ordinal INTEGER NOT NULL CHECK (ordinal >= 0),
  scheme TEXT NOT NULL CHECK (length(scheme) > 0),
  value TEXT NOT NULL CHECK (length(value) > 0),
  PRIMARY KEY (station_id, ordinal),
  UNIQUE (scheme, value),
  FOREIGN KEY (station_id) REFERENCES stations (id) ON DELETE CASCADE ON UPDATE RESTRICT
) STRICT;

CREATE TABLE clock_corrections (
  station_id TEXT NOT NULL,
  ordinal INTEGER NOT NULL CHECK (ordinal >= 0),
  from_epoch_seconds REAL,
  to_epoch_seconds REAL,
  fast_by_seconds REAL NOT NULL CHECK (fast_by_seconds <> 0),
  reason TEXT NOT NULL CHECK (length(reason) > 0),
  CHECK (from_epoch_seconds < to_epoch_seconds),
  PRIMARY KEY (station_id, ordinal),
  FOREIGN KEY (station_id) REFERENCES stations (id) ON DELETE CASCADE ON UPDATE RESTRICT
) STRICT;

ALTER TABLE events ADD COLUMN revision INTEGER NOT NULL DEFAULT 1 CHECK (revision >= 1);
ALTER TABLE events ADD COLUMN merged_into TEXT REFERENCES events (id) ON DELETE RESTRICT ON UPDATE RESTRICT;

-- One storm's swell at one station: its readings, or the estimate that its group sent in their place.
CREATE TABLE arrivals (
  id INTEGER NOT NULL PRIMARY KEY AUTOINCREMENT,
  station_id TEXT NOT NULL,
  event_id TEXT,
  ordinal INTEGER CHECK (ordinal >= 0),
  revision INTEGER NOT NULL DEFAULT 1 CHECK (revision >= 1),
  note TEXT NOT NULL,
  actor TEXT NOT NULL CHECK (length(actor) > 0),
  saved_epoch_seconds REAL NOT NULL,
  CHECK ((event_id IS NULL) = (ordinal IS NULL)),
  UNIQUE (event_id, ordinal),
  FOREIGN KEY (station_id) REFERENCES stations (id) ON DELETE RESTRICT ON UPDATE RESTRICT,
  FOREIGN KEY (event_id) REFERENCES events (id) ON DELETE RESTRICT ON UPDATE RESTRICT
) STRICT;

CREATE INDEX arrivals_station_id_idx ON arrivals (station_id);

INSERT INTO arrivals (station_id, event_id, ordinal, note, actor, saved_epoch_seconds)
SELECT s.station_id, s.event_id, s.ordinal, '', 'intake', e.saved_epoch_seconds
FROM event_stations s JOIN events e ON e.id = s.event_id
ORDER BY e.saved_epoch_seconds, s.event_id, s.ordinal;

CREATE TABLE readings_of_arrivals (
  id INTEGER NOT NULL PRIMARY KEY AUTOINCREMENT,
  arrival_id INTEGER NOT NULL,
  source_row INTEGER NOT NULL CHECK (source_row >= 0),
  kind TEXT NOT NULL CHECK (kind IN ('ridge', 'timed')),
  arrival_epoch_seconds REAL NOT NULL,
  arrival_sigma_seconds REAL NOT NULL CHECK (arrival_sigma_seconds >= 0),
  frequency_hz REAL NOT NULL CHECK (frequency_hz > 0),
  frequency_sigma_hz REAL NOT NULL CHECK (frequency_sigma_hz >= 0),
  comes_from_degrees REAL CHECK (comes_from_degrees BETWEEN 0 AND 360),
  comes_from_sigma_degrees REAL CHECK (comes_from_sigma_degrees > 0),
  quality INTEGER NOT NULL CHECK (quality IN (1, 2, 3, 4, 9)),
  CHECK ((comes_from_degrees IS NULL) = (comes_from_sigma_degrees IS NULL)),
  FOREIGN KEY (arrival_id) REFERENCES arrivals (id) ON DELETE CASCADE ON UPDATE RESTRICT
) STRICT;

INSERT INTO readings_of_arrivals (arrival_id, source_row, kind, arrival_epoch_seconds, arrival_sigma_seconds, frequency_hz,
  frequency_sigma_hz, comes_from_degrees, comes_from_sigma_degrees, quality)
SELECT a.id, r.source_row, r.kind, r.arrival_epoch_seconds, r.arrival_sigma_seconds, r.frequency_hz,
  r.frequency_sigma_hz, r.comes_from_degrees, r.comes_from_sigma_degrees, 2
FROM readings r JOIN arrivals a ON a.event_id = r.event_id AND a.station_id = r.station_id
ORDER BY r.event_id, r.ordinal;

DROP TABLE readings;
ALTER TABLE readings_of_arrivals RENAME TO readings;
-- With the time in it: an event's first arrival and a station's last reading are found without touching the readings.
CREATE INDEX readings_arrival_id_arrival_epoch_seconds_idx ON readings (arrival_id, arrival_epoch_seconds);

CREATE TABLE estimates_of_arrivals (
  id INTEGER NOT NULL PRIMARY KEY AUTOINCREMENT,
  arrival_id INTEGER NOT NULL,
  source_row INTEGER NOT NULL CHECK (source_row >= 0),
  distance_metres REAL NOT NULL CHECK (distance_metres > 0),
  origin_epoch_seconds REAL NOT NULL,
  distance_variance_m2 REAL NOT NULL CHECK (distance_variance_m2 >= 0),
  origin_variance_s2 REAL NOT NULL CHECK (origin_variance_s2 >= 0),
  distance_origin_covariance_m_s REAL NOT NULL,
  comes_from_degrees REAL CHECK (comes_from_degrees BETWEEN 0 AND 360),
  comes_from_sigma_degrees REAL CHECK (comes_from_sigma_degrees > 0),
  shared_shifts_json TEXT NOT NULL CHECK (json_type(shared_shifts_json) = 'array'),
  CHECK ((comes_from_degrees IS NULL) = (comes_from_sigma_degrees IS NULL)),
  -- A correlation lies between -1 and 1; the allowance is for the last binary digit.
  CHECK (
    distance_origin_covariance_m_s * distance_origin_covariance_m_s
      <= distance_variance_m2 * origin_variance_s2 * (1 + 1e-12)
  ),
  FOREIGN KEY (arrival_id) REFERENCES arrivals (id) ON DELETE CASCADE ON UPDATE RESTRICT
) STRICT;

INSERT INTO estimates_of_arrivals (arrival_id, source_row, distance_metres, origin_epoch_seconds, distance_variance_m2,
  origin_variance_s2, distance_origin_covariance_m_s, comes_from_degrees, comes_from_sigma_degrees, shared_shifts_json)
SELECT a.id, e.source_row, e.distance_metres, e.origin_epoch_seconds, e.distance_variance_m2,
  e.origin_variance_s2, e.distance_origin_covariance_m_s, e.comes_from_degrees, e.comes_from_sigma_degrees, e.shared_shifts_json
FROM estimates e JOIN arrivals a ON a.event_id = e.event_id AND a.station_id = e.station_id
ORDER BY e.event_id, e.ordinal;

DROP TABLE estimates;
ALTER TABLE estimates_of_arrivals RENAME TO estimates;
CREATE INDEX estimates_arrival_id_idx ON estimates (arrival_id);

DROP TABLE event_stations;

-- What its maker chose of the event's observations, and the event's revision that it was made from.
ALTER TABLE localizations ADD COLUMN choices_json TEXT NOT NULL
  DEFAULT '{"droppedReadingIds":[],"movedReadings":[],"addedReadings":[],"usesSuspect":false}'
  CHECK (json_type(choices_json) = 'object');
ALTER TABLE localizations ADD COLUMN event_revision INTEGER NOT NULL DEFAULT 1 CHECK (event_revision >= 1);
