/**
 * What a feed fetches for itself. Instants are business time, epoch milliseconds.
 * Comments stand inside the statements: Sequelize runs nothing that begins with one.
 */
export const sql = /* sql */ `
CREATE TABLE feed_pulls (
  feed_id INTEGER PRIMARY KEY REFERENCES feeds(id) ON DELETE CASCADE,
  address TEXT NOT NULL,
  every_hours INTEGER NOT NULL,
  at_minute INTEGER NOT NULL,
  look_back_days INTEGER NOT NULL,
  step_minutes INTEGER,
  credentials_kind TEXT NOT NULL CHECK (credentials_kind IN ('none', 'basic', 'bearer')),
  -- Encrypted under a key of SESSION_SECRET.
  credentials TEXT,
  next_due_at INTEGER NOT NULL,
  failures_in_row INTEGER NOT NULL DEFAULT 0,
  created_at INTEGER NOT NULL,
  version INTEGER NOT NULL DEFAULT 1
);
CREATE INDEX feed_pulls_due ON feed_pulls(next_due_at);
CREATE TABLE pull_runs (
  id INTEGER PRIMARY KEY,
  feed_id INTEGER NOT NULL REFERENCES feeds(id) ON DELETE CASCADE,
  started_at INTEGER NOT NULL,
  ended_at INTEGER NOT NULL,
  outcome TEXT NOT NULL CHECK (outcome IN ('ok', 'failed', 'postponed')),
  fetched INTEGER NOT NULL,
  unchanged INTEGER NOT NULL,
  not_there INTEGER NOT NULL,
  failed INTEGER NOT NULL,
  sentence TEXT
);
CREATE INDEX pull_runs_feed ON pull_runs(feed_id, id);
CREATE TABLE pulled_addresses (
  -- What each address gave last, for asking only for what changed.
  feed_id INTEGER NOT NULL REFERENCES feeds(id) ON DELETE CASCADE,
  address TEXT NOT NULL,
  etag TEXT,
  last_modified TEXT,
  checksum TEXT NOT NULL,
  file_id INTEGER REFERENCES files(id) ON DELETE SET NULL,
  asked_at INTEGER NOT NULL,
  PRIMARY KEY (feed_id, address)
) WITHOUT ROWID;
CREATE TABLE pull_hosts (
  -- Servers that asked to be left alone for a while.
  host TEXT PRIMARY KEY,
  not_before INTEGER NOT NULL,
  refusals INTEGER NOT NULL
) WITHOUT ROWID;
`
