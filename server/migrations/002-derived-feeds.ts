/**
 * Derived layers are recipes: which variables of which files, by the formula of their feed; a recipe that lost one of its
 * bands goes. (Sequelize silently passes over a statement that begins with a comment: there is none in here.)
 */
export const sql = /* sql */ `
ALTER TABLE feeds ADD COLUMN derived_sources TEXT NOT NULL DEFAULT '[]';
ALTER TABLE provenances ADD COLUMN formula TEXT;
CREATE TABLE layer_sources (
  layer_id INTEGER NOT NULL REFERENCES layers(id) ON DELETE CASCADE,
  slot INTEGER NOT NULL,
  file_id INTEGER NOT NULL REFERENCES files(id) ON DELETE CASCADE,
  variable TEXT NOT NULL,
  step INTEGER NOT NULL,
  wavelength_nm REAL NOT NULL,
  PRIMARY KEY (layer_id, slot)
) WITHOUT ROWID;
CREATE INDEX layer_sources_file ON layer_sources(file_id, variable, step);
CREATE TRIGGER layer_sources_gone AFTER DELETE ON layer_sources BEGIN DELETE FROM layers WHERE id = OLD.layer_id; END;
`
