import { QueryClientProvider } from '@tanstack/react-query'
import { StrictMode } from 'react'
import { createRoot } from 'react-dom/client'
import { RouterProvider } from 'react-router-dom'
import { makeQueryClient } from './api/query-client'
import { MarkSprite } from './components/ui/mark-sprite'
import { startTheme } from './hooks/use-theme'
import './index.css'
import { UploadProvider } from './pages/layers/upload-provider'
import { router } from './router'

const root = document.getElementById('root')
if (!root) throw new Error('index.html has no root element')

startTheme()
createRoot(root).render(
  <StrictMode>
    <QueryClientProvider client={makeQueryClient()}>
      <MarkSprite />
      <UploadProvider>
        <RouterProvider router={router} />
      </UploadProvider>
    </QueryClientProvider>
  </StrictMode>,
)
