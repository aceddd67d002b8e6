import type { Alert } from '../../../shared/schemas/alerts'
import type { Me } from '../../../shared/schemas/auth'
import type { Today } from '../../../shared/schemas/today'

export const officer: Me = {
  id: 1, email: 'ines@demo.example', name: 'Ines Marrow', roles: ['officer'], timeZone: 'UTC', demo: true, mailPage: true,
}

export function anAlert(change: Partial<Alert> = {}): Alert {
  return {
    id: 41, regionId: 3, regionName: 'Tarrow Bay', feedId: 1, feedName: 'Chlorophyll, daily', state: 'open', phase: 'running', severity: 'Severe',
    raisedAt: '2026-06-11T03:00:00Z', triggerDay: '2026-06-10',
    story: 'Building since 6 to 10 June; 2 usable views, the newest flagged on 11 June.', statement: { lead: 'Severe.', rest: 'Tarrow Bay is at 3.4 times usual.' },
    evidence: {
      statistic: 'median', unit: 'mg m-3', value: 4.89, usual: 1.44, p10: 0.81, p90: 2.54, threshold: 2.88, timesUsual: 3.4, coverage: 0.71,
      coverageFloor: 0.25, wholeValid: 312, cells: 440, day: '2026-06-10', layerId: 7, layerObservedAt: '2026-06-10T13:04:00Z', fileId: 9,
      fileName: 'chl_20260610.nc', checksum: '9f2c41d0'.padEnd(64, '0'), processingVersion: 'R1', ruleId: 2, ruleVersion: 4,
      ruleText: 'Median above the seasonal p90.', baselineVersion: 7, baselineYears: [2016, 2017, 2018], geometryVersion: 1,
      waterMask: 'valid 5 % v1', softwareVersion: '0.1.0',
    },
    latest: null, recent: [], acknowledgedBy: null, acknowledgedAt: null, assignee: null, hold: null, outcome: null, cause: null, closedAt: null, version: 3,
    event: {
      id: 5, regionId: 3, feedId: 1, ruleId: 2, ruleVersion: 4, phase: 'running', lastUnflaggedBefore: '2026-06-06', firstFlagged: '2026-06-08',
      lastFlagged: '2026-06-10', firstUnflaggedAfter: null, triggerDay: '2026-06-10', peakDay: '2026-06-10', peakValue: 4.89, peakTimesUsual: 3.4,
      severity: 'Severe', usableViews: 2, geometryVersion: 1, endedBecause: null, alertId: 41,
    },
    cautions: ['Satellite colour shows neither species nor toxins.'],
    entries: [{ id: 1, at: '2026-06-11T03:00:00Z', kind: 'raised', by: null, text: 'Raised as Severe: second flagged view in 3 days' }],
    assignable: [{ id: 1, name: 'Ines Marrow' }],
    ...change,
  }
}

export function someDays(): Today['days'] {
  return [
    { day: '2026-06-08', seen: 0.6, layerId: 5, due: false, alerts: [] },
    { day: '2026-06-09', seen: null, layerId: null, due: false, alerts: [] },
    { day: '2026-06-10', seen: 0.12, layerId: 7, due: false, alerts: [{ id: 41, severity: 'Severe' }] },
    { day: '2026-06-11', seen: null, layerId: null, due: true, alerts: [] },
  ]
}
