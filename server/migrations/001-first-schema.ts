/**
 * Instants are epoch milliseconds UTC, days are epoch days (local solar), booleans 0 or 1, JSON is text.
 * Summaries are narrow on purpose: a decade of daily views for a hundred regions is a few million rows.
 */
export const sql = /* sql */ `
CREATE TABLE users (
  id INTEGER PRIMARY KEY,
  email TEXT NOT NULL COLLATE NOCASE UNIQUE,
  name TEXT NOT NULL,
  password_hash TEXT,
  time_zone TEXT NOT NULL DEFAULT 'UTC',
  phone TEXT,
  disabled INTEGER NOT NULL DEFAULT 0,
  created_at INTEGER NOT NULL,
  last_seen_at INTEGER,
  version INTEGER NOT NULL DEFAULT 1
);
CREATE TABLE user_roles (
  user_id INTEGER NOT NULL REFERENCES users(id) ON DELETE CASCADE,
  role TEXT NOT NULL CHECK (role IN ('researcher', 'analyst', 'officer', 'admin')),
  PRIMARY KEY (user_id, role)
) WITHOUT ROWID;
CREATE TABLE sessions (
  id INTEGER PRIMARY KEY,
  user_id INTEGER NOT NULL REFERENCES users(id) ON DELETE CASCADE,
  refresh_hash TEXT NOT NULL UNIQUE,
  previous_hash TEXT,
  previous_until INTEGER,
  created_at INTEGER NOT NULL,
  expires_at INTEGER NOT NULL,
  revoked_at INTEGER
);
CREATE INDEX sessions_previous ON sessions(previous_hash);
CREATE TABLE tokens (
  id INTEGER PRIMARY KEY,
  user_id INTEGER NOT NULL REFERENCES users(id) ON DELETE CASCADE,
  name TEXT NOT NULL,
  token_hash TEXT NOT NULL UNIQUE,
  created_at INTEGER NOT NULL,
  last_used_at INTEGER,
  expires_at INTEGER,
  revoked_at INTEGER
);
CREATE TABLE invitations (
  id INTEGER PRIMARY KEY,
  email TEXT NOT NULL COLLATE NOCASE,
  name TEXT NOT NULL,
  roles TEXT NOT NULL,
  token_hash TEXT NOT NULL UNIQUE,
  created_by INTEGER REFERENCES users(id) ON DELETE SET NULL,
  created_at INTEGER NOT NULL,
  expires_at INTEGER NOT NULL,
  accepted_at INTEGER
);
CREATE TABLE password_resets (
  id INTEGER PRIMARY KEY,
  user_id INTEGER NOT NULL REFERENCES users(id) ON DELETE CASCADE,
  token_hash TEXT NOT NULL UNIQUE,
  expires_at INTEGER NOT NULL,
  used_at INTEGER
);

CREATE TABLE feeds (
  id INTEGER PRIMARY KEY,
  name TEXT NOT NULL UNIQUE,
  quantity TEXT NOT NULL,
  variable TEXT NOT NULL,
  unit TEXT,
  scale TEXT NOT NULL CHECK (scale IN ('log10', 'linear')),
  cadence TEXT NOT NULL,
  stage TEXT NOT NULL,
  processing_version TEXT NOT NULL,
  valid_min REAL,
  valid_max REAL,
  file_name_pattern TEXT,
  freshness_limit_hours REAL NOT NULL,
  silent_after_hours REAL NOT NULL,
  derived_from INTEGER REFERENCES feeds(id),
  formula TEXT,
  formula_version TEXT,
  retired INTEGER NOT NULL DEFAULT 0,
  created_at INTEGER NOT NULL,
  version INTEGER NOT NULL DEFAULT 1
);
CREATE TABLE files (
  id INTEGER PRIMARY KEY,
  name TEXT NOT NULL,
  checksum TEXT NOT NULL,
  bytes INTEGER NOT NULL,
  status TEXT NOT NULL CHECK (status IN ('received', 'processing', 'processed', 'waiting', 'refused')),
  origin TEXT NOT NULL,
  uploaded_by INTEGER REFERENCES users(id) ON DELETE SET NULL,
  received_at INTEGER NOT NULL,
  processed_at INTEGER,
  feed_id INTEGER REFERENCES feeds(id),
  observed_at INTEGER,
  report TEXT,
  proposal TEXT,
  waiting_for TEXT,
  refusal TEXT
);
CREATE UNIQUE INDEX files_once ON files(checksum, ifnull(feed_id, 0), ifnull(observed_at, -1));
CREATE INDEX files_status ON files(status, id);
CREATE TABLE grids (
  id INTEGER PRIMARY KEY,
  fingerprint TEXT NOT NULL UNIQUE,
  kind TEXT NOT NULL,
  row_count INTEGER NOT NULL,
  column_count INTEGER NOT NULL,
  west REAL NOT NULL,
  south REAL NOT NULL,
  east REAL NOT NULL,
  north REAL NOT NULL,
  definition TEXT NOT NULL
);
CREATE TABLE layers (
  id INTEGER PRIMARY KEY,
  feed_id INTEGER NOT NULL REFERENCES feeds(id),
  file_id INTEGER NOT NULL REFERENCES files(id) ON DELETE CASCADE,
  grid_id INTEGER NOT NULL REFERENCES grids(id),
  variable TEXT NOT NULL,
  step INTEGER NOT NULL,
  observed_at INTEGER NOT NULL,
  ends_at INTEGER,
  has_clock INTEGER NOT NULL,
  checksum TEXT NOT NULL,
  processing_version TEXT NOT NULL,
  stage TEXT NOT NULL,
  received_at INTEGER NOT NULL,
  suspect_at INTEGER,
  suspect_by INTEGER REFERENCES users(id) ON DELETE SET NULL,
  suspect_note TEXT
);
CREATE UNIQUE INDEX layers_once ON layers(feed_id, observed_at, checksum, step);
CREATE INDEX layers_file ON layers(file_id, step);

CREATE TABLE regions (
  id INTEGER PRIMARY KEY,
  name TEXT NOT NULL,
  time_zone TEXT NOT NULL,
  site TEXT,
  contacts TEXT NOT NULL DEFAULT '[]',
  shore_buffer_km REAL NOT NULL DEFAULT 0,
  optically_complex INTEGER NOT NULL DEFAULT 0,
  geometry_id INTEGER,
  wanted_feed_id INTEGER REFERENCES feeds(id),
  created_by INTEGER REFERENCES users(id) ON DELETE SET NULL,
  created_at INTEGER NOT NULL,
  retired_at INTEGER,
  version INTEGER NOT NULL DEFAULT 1
);
CREATE TABLE geometries (
  id INTEGER PRIMARY KEY,
  region_id INTEGER NOT NULL REFERENCES regions(id),
  version INTEGER NOT NULL,
  geometry TEXT NOT NULL,
  repairs TEXT NOT NULL DEFAULT '[]',
  area_km2 REAL NOT NULL,
  west REAL NOT NULL,
  south REAL NOT NULL,
  east REAL NOT NULL,
  north REAL NOT NULL,
  centre_longitude REAL NOT NULL,
  created_by INTEGER REFERENCES users(id) ON DELETE SET NULL,
  created_at INTEGER NOT NULL,
  UNIQUE (region_id, version)
);
CREATE TABLE masks (
  id INTEGER PRIMARY KEY,
  feed_id INTEGER NOT NULL REFERENCES feeds(id),
  grid_id INTEGER NOT NULL REFERENCES grids(id),
  version INTEGER NOT NULL,
  kind TEXT NOT NULL,
  -- One byte a cell; null for the bundled land outline, which is a function of place and kept with the cell weights.
  water BLOB,
  checksum TEXT NOT NULL,
  created_at INTEGER NOT NULL,
  UNIQUE (feed_id, grid_id, version)
);
CREATE TABLE cell_weights (
  geometry_id INTEGER NOT NULL REFERENCES geometries(id) ON DELETE CASCADE,
  grid_id INTEGER NOT NULL REFERENCES grids(id) ON DELETE CASCADE,
  cells INTEGER NOT NULL,
  cell_index BLOB NOT NULL,
  share BLOB NOT NULL,
  area_km2 BLOB NOT NULL,
  outline_water BLOB NOT NULL,
  PRIMARY KEY (geometry_id, grid_id)
) WITHOUT ROWID;
CREATE TABLE provenances (
  id INTEGER PRIMARY KEY,
  grid_id INTEGER NOT NULL REFERENCES grids(id),
  mask_id INTEGER NOT NULL REFERENCES masks(id),
  processing_version TEXT NOT NULL,
  software_version TEXT NOT NULL,
  UNIQUE (grid_id, mask_id, processing_version, software_version)
);
CREATE TABLE summaries (
  geometry_id INTEGER NOT NULL REFERENCES geometries(id) ON DELETE CASCADE,
  feed_id INTEGER NOT NULL REFERENCES feeds(id),
  day INTEGER NOT NULL,
  layer_id INTEGER NOT NULL,
  provenance_id INTEGER NOT NULL REFERENCES provenances(id),
  observed_at INTEGER NOT NULL,
  ends_at INTEGER,
  cells INTEGER NOT NULL,
  valid INTEGER NOT NULL,
  whole_cells INTEGER NOT NULL,
  whole_valid INTEGER NOT NULL,
  coverage REAL,
  valid_area_km2 REAL NOT NULL,
  mean REAL,
  geometric_mean REAL,
  median REAL,
  p10 REAL,
  p25 REAL,
  p75 REAL,
  p90 REAL,
  p95 REAL,
  max REAL,
  max_lat REAL,
  max_lon REAL,
  sd_log10 REAL,
  departure REAL,
  non_positive INTEGER NOT NULL DEFAULT 0,
  histogram BLOB,
  PRIMARY KEY (geometry_id, feed_id, day)
) WITHOUT ROWID;
CREATE TABLE view_layers (
  geometry_id INTEGER NOT NULL REFERENCES geometries(id) ON DELETE CASCADE,
  feed_id INTEGER NOT NULL,
  day INTEGER NOT NULL,
  layer_id INTEGER NOT NULL REFERENCES layers(id) ON DELETE CASCADE,
  PRIMARY KEY (geometry_id, feed_id, day, layer_id)
) WITHOUT ROWID;
CREATE INDEX view_layers_layer ON view_layers(layer_id);
CREATE TABLE baselines (
  id INTEGER PRIMARY KEY,
  geometry_id INTEGER NOT NULL REFERENCES geometries(id) ON DELETE CASCADE,
  feed_id INTEGER NOT NULL REFERENCES feeds(id),
  statistic TEXT NOT NULL,
  version INTEGER NOT NULL,
  half_width_days INTEGER NOT NULL,
  smoothing_days INTEGER NOT NULL,
  coverage_floor REAL NOT NULL,
  years TEXT NOT NULL,
  processing_version TEXT NOT NULL,
  source_hash TEXT NOT NULL,
  columns TEXT NOT NULL,
  created_at INTEGER NOT NULL,
  UNIQUE (geometry_id, feed_id, statistic, version)
);
CREATE TABLE rules (
  id INTEGER PRIMARY KEY,
  region_id INTEGER NOT NULL REFERENCES regions(id),
  feed_id INTEGER NOT NULL REFERENCES feeds(id),
  name TEXT NOT NULL,
  active_version INTEGER,
  created_by INTEGER REFERENCES users(id) ON DELETE SET NULL,
  created_at INTEGER NOT NULL,
  version INTEGER NOT NULL DEFAULT 1
);
CREATE INDEX rules_region ON rules(region_id);
CREATE TABLE rule_versions (
  id INTEGER PRIMARY KEY,
  rule_id INTEGER NOT NULL REFERENCES rules(id) ON DELETE CASCADE,
  version INTEGER NOT NULL,
  definition TEXT NOT NULL,
  note TEXT NOT NULL DEFAULT '',
  created_by INTEGER REFERENCES users(id) ON DELETE SET NULL,
  created_at INTEGER NOT NULL,
  activated_at INTEGER,
  UNIQUE (rule_id, version)
);
CREATE TABLE standings (
  rule_id INTEGER PRIMARY KEY REFERENCES rules(id) ON DELETE CASCADE,
  geometry_id INTEGER NOT NULL,
  baseline_id INTEGER REFERENCES baselines(id) ON DELETE SET NULL,
  judged_at INTEGER NOT NULL,
  state TEXT NOT NULL CHECK (state IN ('flagged', 'unflagged', 'not-ready', 'not-comparable', 'never-seen')),
  in_event INTEGER NOT NULL,
  severity TEXT,
  day INTEGER,
  layer_id INTEGER,
  observed_at INTEGER,
  coverage REAL,
  value REAL,
  usual REAL,
  p10 REAL,
  p90 REAL,
  threshold REAL,
  times_usual REAL
);
CREATE TABLE events (
  id INTEGER PRIMARY KEY,
  region_id INTEGER NOT NULL REFERENCES regions(id),
  geometry_id INTEGER NOT NULL REFERENCES geometries(id),
  feed_id INTEGER NOT NULL REFERENCES feeds(id),
  rule_id INTEGER NOT NULL REFERENCES rules(id),
  rule_version INTEGER NOT NULL,
  baseline_id INTEGER REFERENCES baselines(id),
  phase TEXT NOT NULL CHECK (phase IN ('running', 'ended', 'lost')),
  last_unflagged_before INTEGER,
  first_flagged INTEGER NOT NULL,
  last_flagged INTEGER NOT NULL,
  first_unflagged_after INTEGER,
  trigger_day INTEGER NOT NULL,
  peak_day INTEGER NOT NULL,
  peak_value REAL NOT NULL,
  peak_times_usual REAL,
  severity TEXT NOT NULL,
  usable_views INTEGER NOT NULL
);
CREATE INDEX events_region ON events(region_id, feed_id, rule_id, first_flagged);
CREATE TABLE alerts (
  id INTEGER PRIMARY KEY,
  region_id INTEGER NOT NULL REFERENCES regions(id),
  feed_id INTEGER NOT NULL REFERENCES feeds(id),
  rule_id INTEGER NOT NULL REFERENCES rules(id),
  event_id INTEGER REFERENCES events(id) ON DELETE SET NULL,
  state TEXT NOT NULL CHECK (state IN ('open', 'acknowledged', 'closed')),
  phase TEXT NOT NULL,
  severity TEXT NOT NULL,
  trigger_day INTEGER NOT NULL,
  raised_at INTEGER NOT NULL,
  evidence TEXT NOT NULL,
  acknowledged_by INTEGER REFERENCES users(id) ON DELETE SET NULL,
  acknowledged_at INTEGER,
  assignee_id INTEGER REFERENCES users(id) ON DELETE SET NULL,
  hold_until INTEGER,
  hold_reason TEXT,
  outcome TEXT,
  cause TEXT,
  closed_by INTEGER REFERENCES users(id) ON DELETE SET NULL,
  closed_at INTEGER,
  version INTEGER NOT NULL DEFAULT 1
);
CREATE UNIQUE INDEX alerts_once ON alerts(rule_id, trigger_day);
CREATE UNIQUE INDEX alerts_one_open ON alerts(region_id) WHERE state <> 'closed';
CREATE TABLE alert_entries (
  id INTEGER PRIMARY KEY,
  alert_id INTEGER NOT NULL REFERENCES alerts(id) ON DELETE CASCADE,
  at INTEGER NOT NULL,
  kind TEXT NOT NULL,
  user_id INTEGER REFERENCES users(id) ON DELETE SET NULL,
  text TEXT NOT NULL
);
CREATE INDEX alert_entries_alert ON alert_entries(alert_id, id);
CREATE TABLE subscriptions (
  id INTEGER PRIMARY KEY,
  user_id INTEGER NOT NULL REFERENCES users(id) ON DELETE CASCADE,
  all_regions INTEGER NOT NULL DEFAULT 1,
  minimum_severity TEXT NOT NULL,
  delivery TEXT NOT NULL,
  paused_until INTEGER,
  version INTEGER NOT NULL DEFAULT 1
);
CREATE TABLE subscription_regions (
  subscription_id INTEGER NOT NULL REFERENCES subscriptions(id) ON DELETE CASCADE,
  region_id INTEGER NOT NULL REFERENCES regions(id) ON DELETE CASCADE,
  PRIMARY KEY (subscription_id, region_id)
) WITHOUT ROWID;
CREATE TABLE letters (
  id INTEGER PRIMARY KEY,
  kind TEXT NOT NULL,
  dedupe_key TEXT NOT NULL UNIQUE,
  user_id INTEGER REFERENCES users(id) ON DELETE SET NULL,
  to_address TEXT NOT NULL,
  alert_id INTEGER REFERENCES alerts(id) ON DELETE SET NULL,
  message_id TEXT NOT NULL UNIQUE,
  in_reply_to TEXT,
  subject TEXT NOT NULL,
  text_part TEXT NOT NULL,
  html_part TEXT,
  state TEXT NOT NULL CHECK (state IN ('waiting', 'delivered', 'failed')),
  attempts INTEGER NOT NULL DEFAULT 0,
  next_attempt_at INTEGER,
  delivered_at INTEGER,
  last_error TEXT,
  created_at INTEGER NOT NULL
);
CREATE INDEX letters_due ON letters(state, next_attempt_at);
CREATE TABLE jobs (
  id INTEGER PRIMARY KEY,
  kind TEXT NOT NULL,
  job_key TEXT NOT NULL,
  subject TEXT NOT NULL,
  payload TEXT NOT NULL,
  state TEXT NOT NULL CHECK (state IN ('waiting', 'running', 'paused', 'done', 'failed', 'cancelled')),
  priority INTEGER NOT NULL,
  done INTEGER NOT NULL DEFAULT 0,
  total INTEGER NOT NULL DEFAULT 0,
  attempts INTEGER NOT NULL DEFAULT 0,
  run_after INTEGER,
  lease_owner TEXT,
  lease_until INTEGER,
  last_error TEXT,
  created_at INTEGER NOT NULL,
  updated_at INTEGER NOT NULL
);
CREATE UNIQUE INDEX jobs_waiting_once ON jobs(kind, job_key) WHERE state = 'waiting';
CREATE INDEX jobs_next ON jobs(state, priority, id);
CREATE TABLE audit (
  id INTEGER PRIMARY KEY,
  at INTEGER NOT NULL,
  user_id INTEGER REFERENCES users(id) ON DELETE SET NULL,
  action TEXT NOT NULL,
  subject TEXT NOT NULL,
  details TEXT NOT NULL DEFAULT '{}'
);
CREATE TABLE settings (
  name TEXT PRIMARY KEY,
  value TEXT NOT NULL
) WITHOUT ROWID;
`
