import work from './worker'
import { outcomeOf, type Workers } from './workers'

/** The same tasks on the caller's own thread: for commands and tests, where nothing needs to stay answerable. */
export function inProcessWorkers(): Workers {
  const run: Workers['light'] = async (task, input) => outcomeOf(await work({ task, input }))
  return { light: run, heavy: run, second: run, close: async () => undefined }
}
