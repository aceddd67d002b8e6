import work from '../../server/workers/worker'
import { outcomeOf, type Workers } from '../../server/workers/workers'

/** The real tasks, run on the test's own thread: nothing to start, nothing to bundle. */
export function inProcessWorkers(): Workers {
  const run: Workers['light'] = async (task, input) => outcomeOf(await work({ task, input }))
  return { light: run, heavy: run, close: async () => undefined }
}
