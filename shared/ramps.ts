import { mixed, rgbOf, type Rgb } from './ok-lab'

export type Theme = 'light' | 'night'
/** `sea`: one way, dark to light. `departure`: two ways from a neutral middle. */
export type RampName = 'sea' | 'departure'

const colours = (text: string): readonly string[] => text.split(' ')

/** Colours at even steps along a scale; even steps of lightness on an OKLab path. */
export const ramps: Record<RampName, Record<Theme, readonly string[]>> = {
  sea: {
    light: colours('#22175b #282c66 #2e3e70 #35517a #3c6382 #447787 #4e8a8b #579d8e #72ae90 #95bb90 #b7c98f #d8d68d #f9e38a'),
    night: colours('#1e1155 #22245e #263566 #2a466e #2f5774 #356877 #3c797a #448a7b #5d987b #7ea379 #9eae76 #bcb972 #dac46b'),
  },
  departure: {
    light: colours('#00486a #30607e #537991 #7693a4 #9aadb8 #bfc8ca #e6e2da #d9c0b0 #c8a08b #b58066 #a16143 #8c431e #702900'),
    night: colours('#7cb9e1 #6da0c0 #5f87a1 #516f82 #445763 #374146 #2c2b29 #4d3b31 #6d4b3c #8d5d47 #af6f52 #d1825f #f4956c'),
  },
}

/** The two colours of a screen, as places on the sea ramp: far apart in lightness, neither like paper or land. */
export const screenShares = { no: 0.3, yes: 1 } as const

/** The colour at a share of the way along a ramp; beyond the ends the end's own colour. */
export function rampColour(ramp: readonly string[], share: number): Rgb {
  const place = Math.min(Math.max(Number.isNaN(share) ? 0 : share, 0), 1) * (ramp.length - 1)
  const lower = Math.min(Math.floor(place), ramp.length - 2)
  return mixed(rgbOf(ramp[lower]!), rgbOf(ramp[lower + 1]!), place - lower)
}
