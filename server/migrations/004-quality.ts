/** What hides a cell, how a feed's numbers are read where the file does not say, and the area masked for each reason. */
export const sql = /* sql */ `
ALTER TABLE feeds ADD COLUMN hidden_flags TEXT NOT NULL DEFAULT '[]';
ALTER TABLE feeds ADD COLUMN flag_meanings TEXT NOT NULL DEFAULT '[]';
ALTER TABLE feeds ADD COLUMN gap_filled INTEGER NOT NULL DEFAULT 0;
ALTER TABLE feeds ADD COLUMN stored_log10 INTEGER NOT NULL DEFAULT 0;
ALTER TABLE feeds ADD COLUMN file_unit TEXT;
CREATE TABLE summary_reasons (
  geometry_id INTEGER NOT NULL REFERENCES geometries(id) ON DELETE CASCADE,
  feed_id INTEGER NOT NULL REFERENCES feeds(id),
  day INTEGER NOT NULL,
  reason TEXT NOT NULL,
  area_km2 REAL NOT NULL,
  PRIMARY KEY (geometry_id, feed_id, day, reason)
) WITHOUT ROWID;
`
