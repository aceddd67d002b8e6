import { createBrowserRouter, type RouteObject } from 'react-router-dom'
import { paths } from '../shared/paths'
import { PageFault } from './components/frame/page-fault'
import { PageOnItsWay } from './components/frame/page-on-its-way'
import { RequireAction } from './components/frame/require-action'
import { RequireSession } from './components/frame/require-session'

const pages = import.meta.glob<{ Component: React.ComponentType }>('./pages/*/index.tsx')

/** Each page is a file of its own, fetched when it is first opened. */
function page(path: { pattern: string }, folder: string): RouteObject {
  const file = `./pages/${folder}/index.tsx`
  return {
    path: path.pattern,
    errorElement: <PageFault />,
    hydrateFallbackElement: <PageOnItsWay />,
    lazy: async () => {
      const load = pages[file]
      if (!load) throw new Error(`there is no page in ${file}`)
      return load()
    },
  }
}

export const router = createBrowserRouter([
  page(paths.signIn, 'sign-in'),
  page(paths.forgotPassword, 'forgot-password'),
  page(paths.resetPassword, 'reset-password'),
  page(paths.acceptInvitation, 'invitation'),
  page(paths.mail, 'mail'),
  {
    element: <RequireSession />,
    errorElement: <PageFault />,
    hydrateFallbackElement: <PageOnItsWay />,
    children: [
      page(paths.today, 'today'),
      page(paths.alerts, 'alerts'),
      page(paths.alert, 'alert'),
      page(paths.regions, 'regions'),
      page(paths.region, 'region'),
      page(paths.layers, 'layers'),
      page(paths.file, 'file'),
      page(paths.feeds, 'feeds'),
      page(paths.feed, 'feed'),
      page(paths.account, 'account'),
      { element: <RequireAction action="region:edit" />, children: [page(paths.newRegion, 'new-region'), page(paths.editRegion, 'edit-region')] },
      { element: <RequireAction action="people:edit" />, children: [page(paths.people, 'people')] },
      { element: <RequireAction action="subscription:any" />, children: [page(paths.subscriptions, 'subscriptions')] },
      { element: <RequireAction action="job:any" />, children: [page(paths.jobs, 'jobs')] },
      { element: <RequireAction action="letter:any" />, children: [page(paths.letters, 'letters')] },
      { element: <RequireAction action="audit:read" />, children: [page(paths.audit, 'audit')] },
      page({ pattern: '*' }, 'not-found'),
    ],
  },
])
