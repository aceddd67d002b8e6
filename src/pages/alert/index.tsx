import { useQuery } from '@tanstack/react-query'
import { useParams } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import { alertQuery } from '../../api/alerts'
import { ApiError } from '../../api/api-error'
import { ButtonLink } from '../../components/ui/button'
import { Failure } from '../../components/ui/failure'
import { Page, Statement } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { AlertSheet } from './alert-sheet'

export function Component() {
  const id = Number(useParams()['id'])
  const { data: alert, error, refetch } = useQuery({ ...alertQuery(id), enabled: Number.isInteger(id) && id > 0 })
  if (alert) {
    return (
      <Page title={`${alert.severity}: ${alert.regionName}`}>
        <AlertSheet key={alert.id} alert={alert} />
      </Page>
    )
  }
  const missing = !(id > 0) || (error instanceof ApiError && error.status === 404)
  return (
    <Page title="Alert">
      {missing ? (
        <>
          <Statement>There is no such alert.</Statement>
          <div>
            <ButtonLink kind="filled" to={paths.alerts.to()}>
              All alerts
            </ButtonLink>
          </div>
        </>
      ) : error ? (
        <Failure error={error} onRetry={() => void refetch()} />
      ) : (
        <Waiting lines={6} label="Waiting for the alert" />
      )}
    </Page>
  )
}
