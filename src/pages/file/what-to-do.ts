import type { RefusalCode } from '../../../shared/errors'

const steps: Record<RefusalCode, string> = {
  'empty-file': 'Send it again when it has been written completely.',
  'unknown-format': 'Send NetCDF-4, classic NetCDF or GeoTIFF.',
  truncated: 'Fetch it again from its source and send it whole.',
  damaged: 'Fetch it again from its source and send it again.',
  'unsupported-encoding': 'Write it again with gzip or without compression and send that.',
  'too-large': 'Cut out the sea you watch and send that, or ask an administrator to raise the limit.',
  'no-grid': 'Send a file whose variables lie on a grid of latitude and longitude.',
  'unknown-place': 'Send a file that tells where its cells lie.',
  'no-time': 'Send it again with its time in the field beside the chooser.',
  'unknown-time': 'Send it again with its time in the field beside the chooser.',
  climatology: 'Send the layers themselves; what is usual is worked out here.',
  'not-surface': 'Send its level at the surface.',
  'no-quantity': 'Send a file that holds chlorophyll or reflectance, or choose its feed beside the chooser.',
  'unknown-unit': 'Send it with a unit this program knows, such as mg m-3.',
  'not-this-feed': 'Send it again without a feed, or choose the feed it belongs to.',
  'reading-failed': 'Send it again; if it fails again, an administrator finds the reason among the jobs.',
  'reading-ended': 'Cut out the sea you watch and send that, or give the server more memory and send it again.',
  'not-readable': 'An administrator gives the server leave to read it, then puts it back into the inbox.',
}

/** The next step after a refusal; codes of a later version have none here. */
export function whatToDo(code: string): string {
  return code in steps ? steps[code as RefusalCode] : ''
}
