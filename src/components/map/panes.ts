/** Drawing order of the map, from the ground up: cells, land, outlines, what stands on them. */
export const cellPane = 'cells'
export const landPane = 'land'
export const outlinePane = 'outlines'
export const ringPane = 'rings'

export const paneOrder: Record<string, number> = { [cellPane]: 200, [landPane]: 300, [ringPane]: 400, [outlinePane]: 410 }
