/** Standings and judging ask for the newest job of a kind over one outline or feed. */
export const sql = /* sql */ `
CREATE INDEX jobs_by_key ON jobs(kind, job_key, id);
`
