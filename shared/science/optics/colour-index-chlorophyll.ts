/**
 * Chlorophyll by the colour index of clear water: how far green lies below the line from blue to red. Hu, Lee & Franz
 * 2012, JGR 117 C01011, doi:10.1029/2011JC007395 (version 2012); Hu et al. 2019, JGR Oceans 124:1524-1543,
 * doi:10.1029/2019JC014941 (version 2019). Coefficients verified in the public Level-2 processing source.
 */
export const colourIndexVersions = {
  '2012': { a: -0.4909, b: 191.659 },
  '2019': { a: -0.4287, b: 230.47 },
} as const
export type ColourIndexVersion = keyof typeof colourIndexVersions

/** (555 - 443) / (670 - 443): the place of green between blue and red. */
const greenPlace = 112 / 227

/** Colour index in sr-1 of Rrs at 443, 555 and 670 nm, not above 0; NaN where a band is missing. */
export function colourIndex(rrs443: number, rrs555: number, rrs670: number): number {
  return Math.min(0, rrs555 - (rrs443 + greenPlace * (rrs670 - rrs443)))
}

/** Chlorophyll-a in mg m-3 of Rrs (sr-1) at 443, 555 and 670 nm; meant for 0.25 and less. NaN where a band is missing. */
export function colourIndexChlorophyll(rrs443: number, rrs555: number, rrs670: number, version: ColourIndexVersion): number {
  const { a, b } = colourIndexVersions[version]
  return 10 ** (a + b * colourIndex(rrs443, rrs555, rrs670))
}
