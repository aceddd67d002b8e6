import { createBrowserRouter, type RouteObject } from 'react-router-dom'
import { paths } from '../shared/paths'
import type { Action } from '../shared/permissions'
import { PageFault } from './components/frame/page-fault'
import { PageOnItsWay } from './components/frame/page-on-its-way'
import { RequireAction } from './components/frame/require-action'
import { RequireSession } from './components/frame/require-session'

type Load = () => Promise<{ Component: React.ComponentType }>

/** Each page is a file of its own, fetched when it is first opened. */
function page(path: { pattern: string }, lazy: Load): RouteObject {
  return { path: path.pattern, errorElement: <PageFault />, hydrateFallbackElement: <PageOnItsWay />, lazy }
}

function forThoseWhoMay(action: Action, ...children: RouteObject[]): RouteObject {
  return { element: <RequireAction action={action} />, children }
}

export const router = createBrowserRouter([
  page(paths.signIn, () => import('./pages/sign-in')),
  page(paths.forgotPassword, () => import('./pages/forgot-password')),
  page(paths.resetPassword, () => import('./pages/reset-password')),
  page(paths.acceptInvitation, () => import('./pages/invitation')),
  page(paths.mail, () => import('./pages/mail')),
  {
    element: <RequireSession />,
    errorElement: <PageFault />,
    hydrateFallbackElement: <PageOnItsWay />,
    children: [
      page(paths.today, () => import('./pages/today')),
      page(paths.alerts, () => import('./pages/alerts')),
      page(paths.alert, () => import('./pages/alert')),
      page(paths.regions, () => import('./pages/regions')),
      page(paths.region, () => import('./pages/region')),
      page(paths.layers, () => import('./pages/layers')),
      page(paths.layerMap, () => import('./pages/layer-map')),
      page(paths.file, () => import('./pages/file')),
      page(paths.feeds, () => import('./pages/feeds')),
      page(paths.feed, () => import('./pages/feed')),
      page(paths.account, () => import('./pages/account')),
      forThoseWhoMay(
        'region:edit',
        page(paths.newRegion, () => import('./pages/new-region')),
        page(paths.importRegions, () => import('./pages/import-regions')),
        page(paths.editRegion, () => import('./pages/edit-region')),
      ),
      forThoseWhoMay('people:edit', page(paths.people, () => import('./pages/people'))),
      forThoseWhoMay('subscription:any', page(paths.subscriptions, () => import('./pages/subscriptions'))),
      forThoseWhoMay('job:any', page(paths.jobs, () => import('./pages/jobs'))),
      forThoseWhoMay('letter:any', page(paths.letters, () => import('./pages/letters'))),
      forThoseWhoMay('audit:read', page(paths.audit, () => import('./pages/audit'))),
      page({ pattern: '*' }, () => import('./pages/not-found')),
    ],
  },
])
