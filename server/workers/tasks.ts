/** Every task a worker can do. Each takes and answers plain data and typed arrays; none opens the database. */
export interface Tasks {
  hashPassword: { input: { password: string }; output: string }
  comparePassword: { input: { password: string; hash: string }; output: boolean }
}
