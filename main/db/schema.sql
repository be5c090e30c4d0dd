CREATE TABLE draft (
  id INTEGER PRIMARY KEY CHECK (id = 1),
  version INTEGER NOT NULL,
  saved_at TEXT NOT NULL,
  layout TEXT NOT NULL REFERENCES layout (sha256),
  sources TEXT NOT NULL REFERENCES sources (sha256),
  opening TEXT NOT NULL REFERENCES opening (sha256),
  settings TEXT NOT NULL REFERENCES settings (sha256)
) STRICT;

CREATE TABLE layout (sha256 TEXT PRIMARY KEY, body BLOB NOT NULL) STRICT;

CREATE TABLE measurement (
  id INTEGER PRIMARY KEY,
  name TEXT NOT NULL,
  revision TEXT NOT NULL,
  source TEXT NOT NULL,
  points BLOB NOT NULL
) STRICT;

CREATE TABLE opening (sha256 TEXT PRIMARY KEY, body BLOB NOT NULL) STRICT;

CREATE TABLE project (
  id INTEGER PRIMARY KEY CHECK (id = 1),
  name TEXT NOT NULL,
  created_at TEXT NOT NULL,
  created_by TEXT NOT NULL,
  written_by TEXT NOT NULL,
  last_run INTEGER NOT NULL,
  last_measurement INTEGER NOT NULL
) STRICT;

CREATE TABLE result (sha256 TEXT PRIMARY KEY, body BLOB NOT NULL) STRICT;

CREATE TABLE run (
  run INTEGER PRIMARY KEY,
  started_at TEXT NOT NULL,
  duration_s REAL NOT NULL,
  board TEXT NOT NULL,
  revision TEXT NOT NULL,
  layout TEXT NOT NULL REFERENCES layout (sha256),
  sources TEXT NOT NULL REFERENCES sources (sha256),
  opening TEXT NOT NULL REFERENCES opening (sha256),
  settings TEXT NOT NULL REFERENCES settings (sha256),
  result TEXT NOT NULL REFERENCES result (sha256),
  standard TEXT NOT NULL,
  class TEXT NOT NULL,
  distance_m REAL NOT NULL,
  required_margin_db REAL NOT NULL,
  structure TEXT NOT NULL,
  worst_frequency_hz REAL,
  worst_margin_db REAL,
  verdict TEXT NOT NULL,
  program_version TEXT NOT NULL,
  note TEXT NOT NULL,
  trend BLOB NOT NULL,
  CHECK ((worst_frequency_hz IS NULL) = (worst_margin_db IS NULL))
) STRICT;

CREATE TABLE samples (sha256 TEXT PRIMARY KEY, body BLOB NOT NULL) STRICT;

CREATE TABLE settings (sha256 TEXT PRIMARY KEY, body BLOB NOT NULL) STRICT;

CREATE TABLE sources (sha256 TEXT PRIMARY KEY, body BLOB NOT NULL) STRICT;

CREATE TABLE sources_samples (
  sources TEXT NOT NULL REFERENCES sources (sha256) ON DELETE CASCADE,
  file TEXT NOT NULL,
  samples TEXT NOT NULL REFERENCES samples (sha256),
  PRIMARY KEY (sources, file)
) STRICT, WITHOUT ROWID;

CREATE TABLE ui_state (key TEXT PRIMARY KEY, value TEXT NOT NULL) STRICT, WITHOUT ROWID;

CREATE INDEX run_layout ON run (layout);

CREATE INDEX run_opening ON run (opening);

CREATE INDEX run_result ON run (result);

CREATE INDEX run_settings ON run (settings);

CREATE INDEX run_sources ON run (sources);

CREATE INDEX sources_samples_samples ON sources_samples (samples);
