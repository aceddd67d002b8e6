/**
 * The shore buffer belongs to a version of the outline, as figures hang on it; cells of a region are counted once for
 * each grid; an event may end because its outline was redrawn. Weights can be made again, and are.
 */
export const sql = /* sql */ `
ALTER TABLE geometries ADD COLUMN shore_buffer_km REAL NOT NULL DEFAULT 0;
ALTER TABLE cell_weights ADD COLUMN whole_water INTEGER;
DELETE FROM cell_weights;
ALTER TABLE events ADD COLUMN ended_because TEXT;
`
