interface Facts {
  /** No use asking for the other addresses now: the server itself can't or won't. */
  endsRun?: boolean
  /** Asking again soon would change nothing: it waits for the schedule, or for a person. */
  lasting?: boolean
  /** A server that asked to be left alone; until when, or null where it did not say. */
  rest?: { host: string; until: number | null }
  cause?: unknown
}

/** Why an address could not be fetched, as a sentence for a person. It never holds credentials. */
export class PullFailed extends Error {
  override name = 'PullFailed'
  readonly endsRun: boolean
  readonly lasting: boolean
  readonly rest: { host: string; until: number | null } | null

  constructor(sentence: string, { endsRun = false, lasting = false, rest, cause }: Facts = {}) {
    super(sentence, { cause })
    this.endsRun = endsRun
    this.lasting = lasting
    this.rest = rest ?? null
  }
}

/** Nothing was asked: the server still wants to be left alone. */
export class HostRests extends Error {
  override name = 'HostRests'
  readonly until: number

  constructor(host: string, until: number) {
    super(`${host} asked to be left alone until ${new Date(until).toISOString().slice(0, 16).replace('T', ' ')} UTC.`)
    this.until = until
  }
}

/** The process is being stopped: nothing is said of the run, the job is given back. */
export class PullStopped extends Error {
  override name = 'PullStopped'
}
