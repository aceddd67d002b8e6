import type { LookupAddress } from 'node:dns'
import { lookup } from 'node:dns/promises'
import { isIP } from 'node:net'
import { PullFailed } from './pull-failed'
import { isPublicAddress } from './special-address'

/** Decides for every address asked, redirects included, whether it may be, and which IP addresses it stands for. */
export interface Gate {
  /** Refuses by what the address itself says, without looking it up. */
  check(url: URL): void
  /** The IP addresses to connect to, and no others. */
  admit(url: URL): Promise<LookupAddress[]>
}

export type Resolve = (host: string) => Promise<LookupAddress[]>
const fromSystem: Resolve = (host) => lookup(host, { all: true })

/** An address literal loses its brackets: [::1] is ::1. */
const hostOf = (url: URL) => url.hostname.replace(/^\[|\]$/g, '')

export function createGate({ allowPrivate, resolve = fromSystem }: { allowPrivate: boolean; resolve?: Resolve }): Gate {
  const refuse = (sentence: string): never => {
    throw new PullFailed(sentence, { endsRun: true, lasting: true })
  }
  const check = (url: URL) => {
    if (url.protocol !== 'https:' && !(allowPrivate && url.protocol === 'http:')) {
      refuse(`Only https addresses are fetched, and this one begins with ${url.protocol}//.`)
    }
    if (url.username || url.password) refuse('An address with a name or a password in it is not asked.')
    const host = hostOf(url)
    if (isIP(host) && !allowPrivate && !isPublicAddress(host)) refuse(`${host} is an address of a private or special network. Those are not asked.`)
  }
  return {
    check,
    admit: async (url) => {
      check(url)
      const host = hostOf(url)
      const family = isIP(host)
      const addresses = family ? [{ address: host, family }] : await resolve(host)
      if (addresses.length === 0) refuse(`${host} has a name that nobody knows.`)
      // One special address among several is enough: nobody could tell which one a connection would have taken.
      const special = allowPrivate ? undefined : addresses.find(({ address }) => !isPublicAddress(address))
      if (special) refuse(`${host} stands for ${special.address}, an address of a private or special network. Those are not asked.`)
      return addresses
    },
  }
}
