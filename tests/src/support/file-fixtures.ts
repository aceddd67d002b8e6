import type { OffingFile } from '../../../shared/schemas/files'

export function aWaitingFile(change: Partial<OffingFile> = {}): OffingFile {
  return {
    id: 9, name: 'west_chl_2026.nc', checksum: '41d0'.padEnd(64, '0'), bytes: 2_412_345, status: 'waiting', origin: 'upload',
    uploadedBy: { id: 2, name: 'Ana Quill' }, receivedAt: '2026-06-11T02:58:00Z', processedAt: null, feedId: null, observedAt: null, refusal: null,
    waitingFor: 'Say its stage and confirm.', progress: null,
    report: {
      format: 'NetCDF-4',
      variables: [
        {
          name: 'chl', longName: 'Chlorophyll concentration', quantity: 'chlorophyll', unit: 'mg m-3', fileUnit: 'mg m-3', conversion: null,
          dimensions: [{ name: 'time', size: 12 }, { name: 'lat', size: 70 }, { name: 'lon', size: 134 }],
          grid: { kind: 'regular', rows: 70, columns: 134, west: -12.5, south: 50.6, east: -6.9, north: 53.5, crs: null },
          times: { count: 12, first: '2026-05-30T00:00:00Z', last: '2026-06-10T00:00:00Z', hasClock: false, from: 'days since 1970-01-01' },
          cells: 112_560, valid: 61_000, min: 0.04, median: 0.94, max: 28.1,
        },
      ],
      warnings: [],
      feeds: [],
    },
    proposal: {
      name: 'Chlorophyll, daily', quantity: 'chlorophyll', variable: 'chl', unit: 'mg m-3', scale: 'log10', cadence: 'daily', stage: 'near-real-time',
      processingVersion: 'R2026.1', validMin: 0.001, validMax: 30, fileNamePattern: 'west_chl_*', freshnessLimitHours: 72, silentAfterHours: 72,
      hiddenFlags: [], flagMeanings: [], gapFilled: false, storedLog10: false, fileUnit: null,
    },
    others: [],
    wouldGive: null,
    layers: [],
    summaries: [],
    ...change,
  }
}
