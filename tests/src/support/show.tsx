import { QueryClientProvider, type QueryClient } from '@tanstack/react-query'
import { render } from '@testing-library/react'
import type { ReactNode } from 'react'
import { createMemoryRouter, RouterProvider } from 'react-router-dom'
import type { Me } from '../../../shared/schemas/auth'
import { meQuery } from '../../../src/api/auth'
import { makeQueryClient } from '../../../src/api/query-client'

interface Given {
  me?: Me
  at?: string
  /** The pattern the shown page stands under. */
  pattern?: string
  others?: { path: string; element: ReactNode }[]
}

export function show(element: ReactNode, { me, at = '/', pattern = '/', others = [] }: Given = {}): QueryClient {
  const client = makeQueryClient()
  client.setDefaultOptions({ queries: { retry: false, staleTime: 20_000 } })
  if (me) client.setQueryData(meQuery.queryKey, me)
  const router = createMemoryRouter([{ path: pattern, element }, ...others], { initialEntries: [at] })
  render(
    <QueryClientProvider client={client}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  )
  return client
}
