import { BlockList, isIP } from 'node:net'

/** IANA's registry of special-purpose IPv4 addresses, with multicast and what is reserved. */
const special4 = [
  ['0.0.0.0', 8], ['10.0.0.0', 8], ['100.64.0.0', 10], ['127.0.0.0', 8], ['169.254.0.0', 16], ['172.16.0.0', 12],
  ['192.0.0.0', 24], ['192.0.2.0', 24], ['192.88.99.0', 24], ['192.168.0.0', 16], ['198.18.0.0', 15], ['198.51.100.0', 24],
  ['203.0.113.0', 24], ['224.0.0.0', 4], ['240.0.0.0', 4],
] as const
/** Inside 2000::/3: protocol assignments and tunnels (which may carry a private IPv4 address), documentation, 6to4. */
const special6 = [['2001::', 23], ['2001:db8::', 32], ['2002::', 16], ['3fff::', 20]] as const

const refused4 = new BlockList()
for (const [net, prefix] of special4) refused4.addSubnet(net, prefix, 'ipv4')
const global6 = new BlockList()
global6.addSubnet('2000::', 3, 'ipv6')
const refused6 = new BlockList()
for (const [net, prefix] of special6) refused6.addSubnet(net, prefix, 'ipv6')

/** Whether an IP address is one of the open internet; private, loopback, link-local and every other special one is not. */
export function isPublicAddress(address: string): boolean {
  const family = isIP(address)
  if (family === 4) return !refused4.check(address, 'ipv4')
  // Only global unicast is open; mapped, translated, unique-local, link-local (with or without zone) lie outside it.
  return family === 6 && !address.includes('%') && global6.check(address, 'ipv6') && !refused6.check(address, 'ipv6')
}
