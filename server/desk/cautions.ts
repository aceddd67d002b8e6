/** Stands by every alert and in every letter about one, before anything is decided. */
export const cautions = [
  'Satellite colour shows pigment near the surface. It shows neither species nor toxins, nor what lies below the surface.',
  'Take a water sample before deciding about harvest or stock. Those decisions belong to the competent authority, the site veterinarian and accredited laboratories; local codes come first.',
] as const

export const opticallyComplexCaution = 'This water is marked as optically complex: sediment cannot be ruled out.'
