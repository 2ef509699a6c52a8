-- Stations, their deployments, events with their readings and estimates, and the audit trail.
-- Times are seconds since 1970 UTC; positions degrees on WGS84, north and east positive.
-- A comparison with NULL is NULL, which a CHECK lets pass: columns that may be empty need no "IS NULL OR".

CREATE TABLE stations (
  id TEXT NOT NULL PRIMARY KEY CHECK (length(id) > 0)
) STRICT;

CREATE TABLE deployments (
  id INTEGER NOT NULL PRIMARY KEY AUTOINCREMENT,
  station_id TEXT NOT NULL,
  ordinal INTEGER NOT NULL CHECK (ordinal >= 0),
  name TEXT NOT NULL,
  latitude_degrees REAL NOT NULL CHECK (latitude_degrees BETWEEN -90 AND 90),
  longitude_degrees REAL NOT NULL CHECK (longitude_degrees BETWEEN -180 AND 180),
  depth_metres REAL CHECK (depth_metres > 0),
  sensor TEXT NOT NULL CHECK (sensor IN ('surface', 'pressure', 'ground')),
  faces_from_degrees REAL CHECK (faces_from_degrees BETWEEN 0 AND 360),
  faces_to_degrees REAL CHECK (faces_to_degrees BETWEEN 0 AND 360),
  record_minutes REAL CHECK (record_minutes > 0),
  stamp TEXT CHECK (stamp IN ('start', 'middle', 'end')),
  time_zone TEXT CHECK (length(time_zone) > 0),
  from_epoch_seconds REAL,
  to_epoch_seconds REAL,
  CHECK ((faces_from_degrees IS NULL) = (faces_to_degrees IS NULL)),
  CHECK (from_epoch_seconds < to_epoch_seconds),
  UNIQUE (station_id, ordinal),
  FOREIGN KEY (station_id) REFERENCES stations (id) ON DELETE RESTRICT ON UPDATE RESTRICT
) STRICT;

CREATE TABLE shelf_legs (
  deployment_id INTEGER NOT NULL,
  ordinal INTEGER NOT NULL CHECK (ordinal >= 0),
  length_metres REAL NOT NULL CHECK (length_metres > 0),
  depth_metres REAL NOT NULL CHECK (depth_metres > 0),
  PRIMARY KEY (deployment_id, ordinal),
  FOREIGN KEY (deployment_id) REFERENCES deployments (id) ON DELETE CASCADE ON UPDATE RESTRICT
) STRICT;

CREATE TABLE events (
  id TEXT NOT NULL PRIMARY KEY CHECK (length(id) > 0),
  title TEXT NOT NULL CHECK (length(title) > 0),
  note TEXT NOT NULL,
  saved_epoch_seconds REAL NOT NULL
) STRICT;

CREATE TABLE event_stations (
  event_id TEXT NOT NULL,
  station_id TEXT NOT NULL,
  ordinal INTEGER NOT NULL CHECK (ordinal >= 0),
  PRIMARY KEY (event_id, station_id),
  UNIQUE (event_id, ordinal),
  FOREIGN KEY (event_id) REFERENCES events (id) ON DELETE CASCADE ON UPDATE RESTRICT,
  FOREIGN KEY (station_id) REFERENCES stations (id) ON DELETE RESTRICT ON UPDATE RESTRICT
) STRICT;

CREATE TABLE readings (
  id INTEGER NOT NULL PRIMARY KEY AUTOINCREMENT,
  event_id TEXT NOT NULL,
  station_id TEXT NOT NULL,
  ordinal INTEGER NOT NULL CHECK (ordinal >= 0),
  source_row INTEGER NOT NULL CHECK (source_row >= 0),
  kind TEXT NOT NULL CHECK (kind IN ('ridge', 'timed')),
  arrival_epoch_seconds REAL NOT NULL,
  arrival_sigma_seconds REAL NOT NULL CHECK (arrival_sigma_seconds >= 0),
  frequency_hz REAL NOT NULL CHECK (frequency_hz > 0),
  frequency_sigma_hz REAL NOT NULL CHECK (frequency_sigma_hz >= 0),
  comes_from_degrees REAL CHECK (comes_from_degrees BETWEEN 0 AND 360),
  comes_from_sigma_degrees REAL CHECK (comes_from_sigma_degrees > 0),
  CHECK ((comes_from_degrees IS NULL) = (comes_from_sigma_degrees IS NULL)),
  UNIQUE (event_id, ordinal),
  FOREIGN KEY (event_id, station_id) REFERENCES event_stations (event_id, station_id)
    ON DELETE CASCADE ON UPDATE RESTRICT
) STRICT;

CREATE INDEX readings_event_id_station_id_idx ON readings (event_id, station_id);

CREATE TABLE estimates (
  id INTEGER NOT NULL PRIMARY KEY AUTOINCREMENT,
  event_id TEXT NOT NULL,
  station_id TEXT NOT NULL,
  ordinal INTEGER NOT NULL CHECK (ordinal >= 0),
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
  UNIQUE (event_id, ordinal),
  FOREIGN KEY (event_id, station_id) REFERENCES event_stations (event_id, station_id)
    ON DELETE CASCADE ON UPDATE RESTRICT
) STRICT;

CREATE INDEX estimates_event_id_station_id_idx ON estimates (event_id, station_id);

CREATE TABLE audit_entries (
  id INTEGER NOT NULL PRIMARY KEY AUTOINCREMENT,
  at_epoch_seconds REAL NOT NULL,
  actor TEXT NOT NULL CHECK (length(actor) > 0),
  action TEXT NOT NULL CHECK (length(action) > 0),
  subject TEXT NOT NULL,
  detail_json TEXT NOT NULL CHECK (json_valid(detail_json))
) STRICT;

CREATE INDEX audit_entries_subject_idx ON audit_entries (subject);

CREATE TRIGGER audit_entries_are_not_changed BEFORE UPDATE ON audit_entries
BEGIN
  SELECT RAISE(ABORT, 'The audit trail is only added to.');
END;

CREATE TRIGGER audit_entries_are_not_removed BEFORE DELETE ON audit_entries
BEGIN
  SELECT RAISE(ABORT, 'The audit trail is only added to.');
END;
