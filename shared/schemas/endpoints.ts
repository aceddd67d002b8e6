import { z } from 'zod'
import * as alerts from './alerts'
import * as auth from './auth'
import { day, idParam, list, page } from './common'
import * as duty from './duty'
import { endpoint } from './endpoint'
import * as feeds from './feeds'
import * as files from './files'
import { layerLegend } from './layer-legend'
import * as layers from './layers'
import * as masks from './masks'
import * as outlines from './outlines'
import * as patches from './patches'
import * as pulls from './pulls'
import * as regions from './regions'
import * as rules from './rules'
import * as running from './running'
import * as series from './series'
import { today } from './today'
import * as users from './users'

/** Where a tile lies is read by its own route, whose answers say what a tile's address is. */
const tileParams = z.object({ id: z.coerce.number().int().positive(), z: z.string(), x: z.string(), y: z.string() })
const place = z.object({ lat: z.coerce.number().min(-90).max(90), lon: z.coerce.number().min(-540).max(540) })

/** Every call of the HTTP interface. Server, client, description and tests read this one list. */
export const endpoints = {
  signIn: endpoint({ method: 'POST', path: '/auth/sign-in', may: 'anyone', summary: 'Sign in', body: auth.credentials, reply: auth.session }),
  signOut: endpoint({ method: 'POST', path: '/auth/sign-out', may: 'anyone', summary: 'Sign out', status: 204 }),
  refresh: endpoint({ method: 'POST', path: '/auth/refresh', may: 'anyone', summary: 'Renew the session', reply: auth.session }),
  me: endpoint({ method: 'GET', path: '/auth/me', may: 'account:own', summary: 'Who is signed in', reply: auth.me }),
  forgotPassword: endpoint({ method: 'POST', path: '/auth/forgot-password', may: 'anyone', summary: 'Ask for a letter to set a new password', body: auth.forgotPassword, status: 202 }),
  resetPassword: endpoint({ method: 'POST', path: '/auth/reset-password', may: 'anyone', summary: 'Set a new password', body: auth.resetPassword, status: 204 }),
  acceptInvitation: endpoint({ method: 'POST', path: '/auth/accept-invitation', may: 'anyone', summary: 'Accept an invitation', body: auth.acceptInvitation, reply: auth.session }),

  listUsers: endpoint({ method: 'GET', path: '/users', may: 'people:edit', summary: 'People', query: page, reply: list(users.user) }),
  createUser: endpoint({ method: 'POST', path: '/users', may: 'people:edit', summary: 'Add a person', body: users.newUser, reply: users.user, status: 201 }),
  changeUser: endpoint({ method: 'PATCH', path: '/users/:id', may: 'people:edit', summary: 'Change a person', params: idParam, body: users.userChange, reply: users.user }),
  listInvitations: endpoint({ method: 'GET', path: '/invitations', may: 'people:edit', summary: 'Invitations', query: page, reply: list(users.invitation) }),
  invite: endpoint({ method: 'POST', path: '/invitations', may: 'people:edit', summary: 'Invite a person by letter', body: users.newInvitation, reply: users.invitation, status: 201 }),
  listTokens: endpoint({ method: 'GET', path: '/tokens', may: 'account:own', summary: 'Own personal tokens', query: page, reply: list(users.token) }),
  createToken: endpoint({ method: 'POST', path: '/tokens', may: 'account:own', summary: 'Make a personal token (shown once)', body: users.newToken, reply: users.issuedToken, status: 201 }),
  deleteToken: endpoint({ method: 'DELETE', path: '/tokens/:id', may: 'account:own', summary: 'Revoke a personal token', params: idParam, status: 204 }),

  today: endpoint({ method: 'GET', path: '/today', may: 'read', summary: 'Is anything wrong, and how fresh is what is known', reply: today }),

  listFeeds: endpoint({ method: 'GET', path: '/feeds', may: 'read', summary: 'Feeds', query: page, reply: list(feeds.feed) }),
  createFeed: endpoint({ method: 'POST', path: '/feeds', may: 'feed:confirm', summary: 'Make a feed; a proposal is a valid body', body: feeds.newFeed, reply: feeds.feed, status: 201 }),
  feed: endpoint({ method: 'GET', path: '/feeds/:id', may: 'read', summary: 'One feed', params: idParam, reply: feeds.feed }),
  changeFeed: endpoint({ method: 'PATCH', path: '/feeds/:id', may: 'feed:edit', summary: 'Change or retire a feed', params: idParam, body: feeds.feedChange, reply: feeds.feed }),
  feedDays: endpoint({ method: 'GET', path: '/feeds/:id/days', may: 'read', summary: 'Which days a feed has layers of', params: idParam, query: z.object({ from: day.optional(), to: day.optional() }), reply: layers.feedDays }),
  feedPull: endpoint({ method: 'GET', path: '/feeds/:id/pull', may: 'read', summary: 'What a feed fetches for itself, and how that goes', params: idParam, reply: pulls.feedPull }),
  keepPull: endpoint({ method: 'PUT', path: '/feeds/:id/pull', may: 'feed:edit', summary: 'Let a feed fetch for itself; credentials are taken and never given out', params: idParam, body: pulls.pullSettings, reply: pulls.feedPull }),
  dropPull: endpoint({ method: 'DELETE', path: '/feeds/:id/pull', may: 'feed:edit', summary: 'Fetch nothing any more', params: idParam, status: 204 }),
  pullNow: endpoint({ method: 'POST', path: '/feeds/:id/pull/now', may: 'feed:edit', summary: 'Fetch now', params: idParam, reply: pulls.feedPull, status: 202 }),

  feedMasks: endpoint({ method: 'GET', path: '/feeds/:id/masks', may: 'read', summary: 'The water masks of a feed, by grid: which is in force, and what each was made from', params: idParam, reply: masks.feedMasks }),
  makeMask: endpoint({ method: 'POST', path: '/feeds/:id/masks', may: 'feed:confirm', summary: 'Make a water mask from the trusted layers of a period; nothing changes until it is put in force', params: idParam, body: masks.newMask, reply: masks.feedMasks, status: 202 }),
  maskChange: endpoint({ method: 'GET', path: '/masks/:id/change', may: 'read', summary: 'What putting this water mask in force would change', params: idParam, reply: masks.maskChange }),
  putMaskInForce: endpoint({ method: 'POST', path: '/masks/:id/in-force', may: 'feed:edit', summary: 'Put this water mask in force: the history of its feed is made and judged anew', params: idParam, body: masks.maskInForce, reply: masks.feedMasks, status: 202 }),
  maskTile: endpoint({ method: 'GET', path: '/masks/:id/tiles/:z/:x/:y.png', may: 'read', summary: 'A map tile of a water mask: water, land, and where it differs from the land outline', params: tileParams, query: z.object({ theme: z.enum(['light', 'night']).default('light') }), contentType: 'image/png' }),

  uploadFiles: endpoint({ method: 'POST', path: '/files', may: 'file:upload', summary: 'Send files', multipart: true, reply: z.object({ items: z.array(files.receipt) }), status: 202 }),
  listFiles: endpoint({ method: 'GET', path: '/files', may: 'read', summary: 'Files, newest first', query: page.extend({ status: files.fileStatus.optional() }), reply: list(files.fileItem) }),
  file: endpoint({ method: 'GET', path: '/files/:id', may: 'read', summary: 'One file: what was understood, or why it was refused', params: idParam, reply: files.file }),
  confirmFeeds: endpoint({ method: 'POST', path: '/files/:id/feeds', may: 'feed:confirm', summary: 'Make several feeds of one waiting file at once; it is read once, by all of them', params: idParam, body: feeds.feedsOfFile, reply: z.object({ items: z.array(feeds.feed), nextCursor: z.null() }), status: 201 }),
  fileTile: endpoint({ method: 'GET', path: '/files/:id/tiles/:z/:x/:y.png', may: 'read', summary: 'A map tile of one variable of a waiting file, before anything is confirmed', params: tileParams, query: files.fileTileQuery, contentType: 'image/png' }),
  deleteFile: endpoint({ method: 'DELETE', path: '/files/:id', may: 'file:upload', summary: 'Delete a file and its layers (own files; an admin, any)', params: idParam, status: 204 }),

  listLayers: endpoint({ method: 'GET', path: '/layers', may: 'read', summary: 'Layers, newest first', query: page.extend({ feedId: z.coerce.number().int().positive().optional(), from: day.optional(), to: day.optional() }), reply: list(layers.layer) }),
  layer: endpoint({ method: 'GET', path: '/layers/:id', may: 'read', summary: 'One layer', params: idParam, reply: layers.layer }),
  layerTile: endpoint({ method: 'GET', path: '/layers/:id/tiles/:z/:x/:y.png', may: 'read', summary: 'A map tile of a layer (Web Mercator, 256 pixels)', params: tileParams, query: z.object({ theme: z.enum(['light', 'night']).default('light'), show: z.enum(['value', 'departure']).default('value') }), contentType: 'image/png' }),
  layerLegend: endpoint({ method: 'GET', path: '/layers/:id/legend', may: 'read', summary: 'What the colours of a layer mean, its values, and why cells are missing', params: idParam, reply: layerLegend }),
  layerPoint: endpoint({ method: 'GET', path: '/layers/:id/point', may: 'read', summary: 'One cell of a layer, and if asked what is usual there', params: idParam, query: place.extend({ usual: z.enum(['true', 'false']).default('false') }), reply: layers.layerPoint }),
  markLayerSuspect: endpoint({ method: 'POST', path: '/layers/:id/suspect', may: 'layer:suspect', summary: 'Mark a layer suspect, or take that back; its days are judged again', params: idParam, body: z.object({ suspect: z.boolean().default(true), note: z.string().trim().max(1000).default('') }), reply: layers.layer }),

  listRegions: endpoint({ method: 'GET', path: '/regions', may: 'read', summary: 'Regions, by worry', query: page, reply: list(regions.region) }),
  createRegion: endpoint({ method: 'POST', path: '/regions', may: 'region:edit', summary: 'Draw a region', body: regions.newRegion, reply: regions.region, status: 201 }),
  regionsGeojson: endpoint({ method: 'GET', path: '/regions.geojson', may: 'read', summary: 'All regions as GeoJSON', reply: regions.featureCollection, contentType: 'application/geo+json' }),
  measureOutline: endpoint({ method: 'POST', path: '/regions/measure', may: 'region:edit', summary: 'An outline as it would be kept, and how many whole water cells each feed has in it; nothing is saved', body: outlines.measureRequest, reply: outlines.measurement }),
  importRegions: endpoint({ method: 'POST', path: '/regions/import', may: 'region:edit', summary: 'Read areas from a GeoJSON, KML or zipped shapefile (field "file", at most 10 MB); saved only with save=true', multipart: true, query: outlines.importQuery, reply: outlines.importReply }),
  region: endpoint({ method: 'GET', path: '/regions/:id', may: 'read', summary: 'One region', params: idParam, reply: regions.region }),
  changeRegion: endpoint({ method: 'PATCH', path: '/regions/:id', may: 'region:edit', summary: 'Change a region', params: idParam, body: regions.regionChange, reply: regions.region }),
  retireRegion: endpoint({ method: 'DELETE', path: '/regions/:id', may: 'region:edit', summary: 'Retire a region; its history stays', params: idParam, status: 204 }),
  steerHistory: endpoint({ method: 'POST', path: '/regions/:id/history', may: 'region:edit', summary: 'Pause or stop the reading of its history, or go on with it', params: idParam, body: regions.historySteering, reply: regions.region }),
  regionVersions: endpoint({ method: 'GET', path: '/regions/:id/versions', may: 'read', summary: 'Every version of its outline, newest first', params: idParam, reply: z.object({ items: z.array(outlines.regionVersion), nextCursor: z.null() }) }),
  regionCells: endpoint({ method: 'GET', path: '/regions/:id/cells', may: 'read', summary: 'The single cells of its newest view, where it holds too few whole water cells for percentiles', params: idParam, query: outlines.cellsQuery, reply: outlines.singleCells }),
  regionView: endpoint({ method: 'GET', path: '/regions/:id/view', may: 'read', summary: 'One view: its figures, where the greatest value is, area by value, water masked by reason', params: idParam, query: patches.viewQuery, reply: patches.regionView }),
  regionPatches: endpoint({ method: 'GET', path: '/regions/:id/patches', may: 'read', summary: 'Connected patches of a view at or above a level: area, greatest value, distance and bearing from the site, change since the view before', params: idParam, query: patches.patchesQuery, reply: patches.regionPatches }),
  regionSeries: endpoint({ method: 'GET', path: '/regions/:id/series', may: 'read', summary: 'Figures of every view', params: idParam, query: series.seriesQuery, reply: series.series }),
  regionBaseline: endpoint({ method: 'GET', path: '/regions/:id/baseline', may: 'read', summary: 'What is usual by day of year', params: idParam, query: series.baselineQuery, reply: series.baseline }),
  regionEvents: endpoint({ method: 'GET', path: '/regions/:id/events', may: 'read', summary: 'Events', params: idParam, query: series.eventsQuery, reply: z.object({ items: z.array(series.bloomEvent), nextCursor: z.null() }) }),
  regionRules: endpoint({ method: 'GET', path: '/regions/:id/rules', may: 'read', summary: 'Rules with their versions', params: idParam, reply: z.object({ items: z.array(rules.rule), nextCursor: z.null() }) }),
  createRule: endpoint({ method: 'POST', path: '/regions/:id/rules', may: 'rule:edit', summary: 'Add a rule (a draft until activated)', params: idParam, body: rules.newRule, reply: rules.rule, status: 201 }),
  changeRule: endpoint({ method: 'PATCH', path: '/rules/:id', may: 'rule:edit', summary: 'Write a new version of a rule', params: idParam, body: rules.ruleChange, reply: rules.rule }),
  activateRule: endpoint({ method: 'POST', path: '/rules/:id/activate', may: 'rule:edit', summary: 'Switch a version of a rule on', params: idParam, body: rules.ruleActivation, reply: rules.rule }),

  listAlerts: endpoint({ method: 'GET', path: '/alerts', may: 'read', summary: 'Alerts, by worry', query: page.extend(alerts.alertsQuery.shape), reply: list(alerts.alertItem) }),
  alert: endpoint({ method: 'GET', path: '/alerts/:id', may: 'read', summary: 'One alert with its timeline', params: idParam, reply: alerts.alert }),
  alertExplanation: endpoint({ method: 'GET', path: '/alerts/:id/explanation', may: 'read', summary: 'Why it fired, computed again from the stored layers', params: idParam, reply: alerts.explanation }),
  acknowledgeAlert: endpoint({ method: 'POST', path: '/alerts/:id/acknowledge', may: 'alert:act', summary: 'Acknowledge', params: idParam, body: alerts.acknowledgement, reply: alerts.alert }),
  noteAlert: endpoint({ method: 'POST', path: '/alerts/:id/notes', may: 'alert:note', summary: 'Add a note', params: idParam, body: alerts.alertNote, reply: alerts.alert, status: 201 }),
  assignAlert: endpoint({ method: 'POST', path: '/alerts/:id/assign', may: 'alert:act', summary: 'Give it to somebody', params: idParam, body: alerts.assignment, reply: alerts.alert }),
  holdAlert: endpoint({ method: 'POST', path: '/alerts/:id/hold', may: 'alert:act', summary: 'Hold until', params: idParam, body: alerts.hold, reply: alerts.alert }),
  closeAlert: endpoint({ method: 'POST', path: '/alerts/:id/close', may: 'alert:act', summary: 'Close with an outcome', params: idParam, body: alerts.closing, reply: alerts.alert }),
  reopenAlert: endpoint({ method: 'POST', path: '/alerts/:id/reopen', may: 'alert:act', summary: 'Reopen', params: idParam, body: alerts.reopening, reply: alerts.alert }),
  stream: endpoint({ method: 'GET', path: '/stream', may: 'read', summary: 'What changed, as server-sent events', contentType: 'text/event-stream' }),

  listSubscriptions: endpoint({ method: 'GET', path: '/subscriptions', may: 'account:own', summary: 'Own subscriptions; an admin sees all', query: page, reply: list(duty.subscription) }),
  createSubscription: endpoint({ method: 'POST', path: '/subscriptions', may: 'account:own', summary: 'Subscribe', body: duty.newSubscription, reply: duty.subscription, status: 201 }),
  changeSubscription: endpoint({ method: 'PATCH', path: '/subscriptions/:id', may: 'account:own', summary: 'Change a subscription', params: idParam, body: duty.subscriptionChange, reply: duty.subscription }),
  deleteSubscription: endpoint({ method: 'DELETE', path: '/subscriptions/:id', may: 'account:own', summary: 'End a subscription', params: idParam, status: 204 }),

  exportSeries: endpoint({ method: 'GET', path: '/exports/regions/:id/series.csv', may: 'read', summary: 'The series as CSV', params: idParam, query: series.seriesQuery, contentType: 'text/csv' }),
  exportOutline: endpoint({ method: 'GET', path: '/exports/regions/:id/outline.geojson', may: 'read', summary: 'Its outline as GeoJSON (RFC 7946, cut at 180 degrees)', params: idParam, query: outlines.outlineQuery, contentType: 'application/geo+json' }),
  exportOutlineKml: endpoint({ method: 'GET', path: '/exports/regions/:id/outline.kml', may: 'read', summary: 'Its outline as KML', params: idParam, query: outlines.outlineQuery, contentType: 'application/vnd.google-earth.kml+xml' }),
  exportAlerts: endpoint({ method: 'GET', path: '/exports/alerts.csv', may: 'read', summary: 'Alerts as CSV', query: alerts.alertsQuery, contentType: 'text/csv' }),

  listJobs: endpoint({ method: 'GET', path: '/jobs', may: 'job:any', summary: 'Jobs, newest first', query: page.extend({ state: z.enum(running.jobStates).optional() }), reply: list(running.job) }),
  retryJob: endpoint({ method: 'POST', path: '/jobs/:id/retry', may: 'job:any', summary: 'Try a failed job again', params: idParam, reply: running.job }),
  pauseJob: endpoint({ method: 'POST', path: '/jobs/:id/pause', may: 'job:any', summary: 'Pause a waiting or running job', params: idParam, reply: running.job }),
  cancelJob: endpoint({ method: 'POST', path: '/jobs/:id/cancel', may: 'job:any', summary: 'Cancel a job', params: idParam, reply: running.job }),
  listLetters: endpoint({ method: 'GET', path: '/letters', may: 'letter:any', summary: 'Letters, newest first', query: page.extend({ state: z.enum(duty.letterStates).optional() }), reply: list(duty.letter) }),
  retryLetter: endpoint({ method: 'POST', path: '/letters/:id/retry', may: 'letter:any', summary: 'Send a letter again', params: idParam, reply: duty.letter }),
  listAudit: endpoint({ method: 'GET', path: '/audit', may: 'audit:read', summary: 'Who did what', query: page, reply: list(running.auditEntry) }),
  health: endpoint({ method: 'GET', path: '/health', may: 'anyone', summary: 'Is it running', reply: running.health }),
  metrics: endpoint({ method: 'GET', path: '/metrics', may: 'metrics:read', summary: 'Counters for a monitor', contentType: 'text/plain' }),

  listCaughtMail: endpoint({ method: 'GET', path: '/mail', may: 'anyone', summary: 'Letters caught by the local mail catcher (demo and development only)', reply: z.object({ items: z.array(duty.caughtLetter), nextCursor: z.null() }) }),
  caughtLetter: endpoint({ method: 'GET', path: '/mail/:id', may: 'anyone', summary: 'One caught letter (demo and development only)', params: z.object({ id: z.string() }), reply: duty.caughtLetter }),
} as const

export type EndpointName = keyof typeof endpoints
