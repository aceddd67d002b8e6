/** A command that was called wrongly: its sentence is followed by the usage, and the exit code is 2. */
export class BadUsage extends Error {
  override name = 'BadUsage'
}
