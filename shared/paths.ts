type Params = Record<string, string | number>

function page<P extends Params | void = void>(pattern: string) {
  return {
    pattern,
    to: (params: P): string =>
      pattern.replace(/:(\w+)/g, (_, name: string) => encodeURIComponent(String((params as Params)[name]))),
  }
}

/** Every page of the client: the pattern for the router, `to` for links and letters. */
export const paths = {
  today: page('/'),
  signIn: page('/sign-in'),
  forgotPassword: page('/forgot-password'),
  resetPassword: page<{ token: string }>('/reset-password/:token'),
  acceptInvitation: page<{ token: string }>('/invitation/:token'),
  alerts: page('/alerts'),
  alert: page<{ id: number }>('/alerts/:id'),
  regions: page('/regions'),
  newRegion: page('/regions/new'),
  importRegions: page('/regions/import'),
  region: page<{ id: number }>('/regions/:id'),
  editRegion: page<{ id: number }>('/regions/:id/edit'),
  layers: page('/layers'),
  layerMap: page('/layers/map'),
  file: page<{ id: number }>('/layers/files/:id'),
  feeds: page('/feeds'),
  feed: page<{ id: number }>('/feeds/:id'),
  account: page('/account'),
  people: page('/admin/people'),
  subscriptions: page('/admin/subscriptions'),
  jobs: page('/admin/jobs'),
  letters: page('/admin/letters'),
  audit: page('/admin/audit'),
  mail: page('/mail'),
} as const
