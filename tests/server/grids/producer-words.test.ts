import { describe, expect, it } from 'vitest'
import { producerWords } from '../../../server/grids/producer-words'

describe('the version of a file', () => {
  it.each([
    [{ processing_version: 'R2022.0', product_version: '6.0' }, 'R2022.0'],
    [{ product_version: ' 6.0 ', version: '1' }, '6.0'], [{ version: 'v3', source_version: 'x' }, 'v3'], [{ source_version: 'S2' }, 'S2'],
    [{ processing_version: ' ', product_version: 5 }, '5'], [{ processing_level: 'L3', software_version: '9' }, null],
  ] as const)('of %j is %s', (attributes, version) => expect(producerWords({ ...attributes }).processingVersion).toBe(version))

  it('is kept to 50 characters', () => expect(producerWords({ version: 'v'.repeat(80) }).processingVersion).toHaveLength(50))
})

describe('the stage of a file', () => {
  it.each([
    [{ title: 'Chlorophyll, reprocessed, daily' }, 'reprocessed'], [{ title: 'OC_GLO_BGC_L3_REP_OBS' }, 'reprocessed'], [{ product_type: 'Reprocessing' }, 'reprocessed'],
    [{ processing_level: 'L3 NRT' }, 'near-real-time'], [{ title: 'Near Real Time chlorophyll' }, 'near-real-time'], [{ product_type: 'near_real_time' }, 'near-real-time'],
    [{ title: 'Report on the representative sea', processing_level: 'L4' }, null], [{}, null],
  ] as const)('of %j is %s', (attributes, stage) => expect(producerWords({ ...attributes }).stage).toBe(stage))

  it('is for a person to tell where the file says both', () => expect(producerWords({ title: 'NRT and REP' }).stage).toBeNull())
})
