/** Weights are made anew when next asked for, with the water of the region that lies outside the grid. */
export const sql = `
ALTER TABLE cell_weights ADD COLUMN outside_water_km2 REAL NOT NULL DEFAULT 0;
DELETE FROM cell_weights;
`
