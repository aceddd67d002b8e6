/**
 * Water masks are made from layers, kept and chosen: what each was made of, which is in force for a feed and grid, how
 * many whole water cells a region has by it, and where the making of one has come to.
 */
export const sql = /* sql */ `
ALTER TABLE masks ADD COLUMN from_day INTEGER;
ALTER TABLE masks ADD COLUMN to_day INTEGER;
ALTER TABLE masks ADD COLUMN min_share REAL;
ALTER TABLE masks ADD COLUMN layers INTEGER;
ALTER TABLE masks ADD COLUMN layers_checksum TEXT;
ALTER TABLE masks ADD COLUMN water_cells INTEGER;
ALTER TABLE masks ADD COLUMN gained INTEGER;
ALTER TABLE masks ADD COLUMN lost INTEGER;
ALTER TABLE masks ADD COLUMN note TEXT NOT NULL DEFAULT '';
ALTER TABLE masks ADD COLUMN made_by INTEGER REFERENCES users(id) ON DELETE SET NULL;
CREATE TABLE masks_in_force (
  feed_id INTEGER NOT NULL REFERENCES feeds(id),
  grid_id INTEGER NOT NULL REFERENCES grids(id),
  mask_id INTEGER NOT NULL REFERENCES masks(id),
  since INTEGER NOT NULL,
  by INTEGER REFERENCES users(id) ON DELETE SET NULL,
  PRIMARY KEY (feed_id, grid_id)
) WITHOUT ROWID;
CREATE TABLE region_masks (
  geometry_id INTEGER NOT NULL REFERENCES geometries(id) ON DELETE CASCADE,
  mask_id INTEGER NOT NULL REFERENCES masks(id),
  whole_water INTEGER NOT NULL,
  PRIMARY KEY (geometry_id, mask_id)
) WITHOUT ROWID;
CREATE TABLE mask_makings (
  id INTEGER PRIMARY KEY,
  feed_id INTEGER NOT NULL REFERENCES feeds(id),
  grid_id INTEGER NOT NULL REFERENCES grids(id),
  kind TEXT NOT NULL,
  from_day INTEGER NOT NULL,
  to_day INTEGER NOT NULL,
  min_share REAL NOT NULL,
  layer_ids TEXT NOT NULL,
  tiles TEXT,
  counts BLOB,
  asked_by INTEGER REFERENCES users(id) ON DELETE SET NULL,
  asked_at INTEGER NOT NULL,
  outcome TEXT,
  mask_id INTEGER REFERENCES masks(id),
  UNIQUE (feed_id, grid_id)
);
`
