/** When layers were made, and which file took the place of which: corrected files win, and what they correct is remembered. */
export const sql = /* sql */ `
ALTER TABLE layers ADD COLUMN produced_at INTEGER;
ALTER TABLE layers ADD COLUMN replaced_by INTEGER REFERENCES files(id) ON DELETE SET NULL;
ALTER TABLE layers ADD COLUMN replaced_at INTEGER;
ALTER TABLE files ADD COLUMN modified_at INTEGER;
ALTER TABLE files ADD COLUMN replaces INTEGER REFERENCES files(id) ON DELETE SET NULL;
ALTER TABLE files ADD COLUMN replaces_wholly INTEGER NOT NULL DEFAULT 0;
CREATE INDEX layers_replaced ON layers(replaced_by) WHERE replaced_by IS NOT NULL;
CREATE INDEX files_replaces ON files(replaces) WHERE replaces IS NOT NULL;
`
