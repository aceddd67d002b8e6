import { screen, waitFor } from '@testing-library/react'
import { useQuery } from '@tanstack/react-query'
import userEvent from '@testing-library/user-event'
import { expect, test } from 'vitest'
import type { Alert } from '../../../shared/schemas/alerts'
import type { Me } from '../../../shared/schemas/auth'
import { endpoints } from '../../../shared/schemas/endpoints'
import { alertQuery } from '../../../src/api/alerts'
import { ActDialogs } from '../../../src/pages/alert/act-dialogs'
import { ActError } from '../../../src/pages/alert/act-error'
import { Acts } from '../../../src/pages/alert/acts'
import { AlertStanding } from '../../../src/pages/alert/alert-standing'
import { NoteForm } from '../../../src/pages/alert/note-form'
import { useActs } from '../../../src/pages/alert/use-acts'
import { fakeServer, refusal, reply } from '../support/fake-server'
import { anAlert, officer } from '../support/fixtures'
import { show } from '../support/show'

function Desk() {
  const { data } = useQuery(alertQuery(41))
  return data ? <DeskOf alert={data} /> : null
}

function DeskOf({ alert }: { alert: Alert }) {
  const acts = useActs(alert)
  return (
    <>
      <AlertStanding alert={alert} />
      <Acts alert={alert} acts={acts} />
      <ActError acts={acts} />
      <NoteForm alert={alert} acts={acts} />
      <ActDialogs alert={alert} acts={acts} />
    </>
  )
}

const byInes = () => anAlert({ state: 'acknowledged', acknowledgedBy: 'Ines Marrow', acknowledgedAt: '2026-06-11T03:12:00Z', version: 4 })
const byDara = () => anAlert({ state: 'acknowledged', acknowledgedBy: 'Dara Quell', acknowledgedAt: '2026-06-11T03:11:00Z', version: 4 })

async function desk(me: Me = officer) {
  show(<Desk />, { me })
  await screen.findByLabelText('Note')
}

test('Acknowledge sends the note and the version that was on screen, and the page says who has it', async () => {
  let stands = anAlert()
  const asked = fakeServer({
    'GET /alerts/41': () => reply(endpoints.alert, stands),
    'POST /alerts/41/acknowledge': () => {
      stands = byInes()
      return reply(endpoints.acknowledgeAlert, stands)
    },
  })
  await desk()
  await userEvent.type(screen.getByLabelText('Note'), 'Rang the growers')
  await userEvent.click(screen.getByRole('button', { name: 'Acknowledge' }))
  expect(await screen.findByText(/by you/)).toHaveTextContent('Acknowledged 11 Jun 03:12 UTC by you.')
  expect(asked.find((a) => a.method === 'POST')?.body).toEqual({ note: 'Rang the growers', version: 3 })
  expect(screen.getByLabelText('Note')).toHaveValue('')
})

test('when somebody else was faster nothing is overwritten, the new state is shown and the note is kept', async () => {
  let stands = anAlert()
  fakeServer({
    'GET /alerts/41': () => reply(endpoints.alert, stands),
    'POST /alerts/41/acknowledge': () => {
      stands = byDara()
      return refusal(409, 'stale-version', 'Somebody else changed this alert meanwhile: It was acknowledged by Dara Quell.')
    },
  })
  await desk()
  await userEvent.type(screen.getByLabelText('Note'), 'Rang the growers')
  await userEvent.click(screen.getByRole('button', { name: 'Acknowledge' }))
  expect(await screen.findByRole('alert')).toHaveTextContent('Nothing was overwritten. Somebody else changed this alert meanwhile')
  await waitFor(() => expect(screen.getByText(/by Dara Quell\./, { selector: '[role=status]' })).toBeInTheDocument())
  expect(screen.queryByRole('button', { name: 'Acknowledge' })).not.toBeInTheDocument()
  expect(screen.getByLabelText('Note')).toHaveValue('Rang the growers')
})

test('without a connection the button stays and nothing is claimed', async () => {
  fakeServer({ 'GET /alerts/41': () => reply(endpoints.alert, anAlert()) })
  await desk()
  await userEvent.click(screen.getByRole('button', { name: 'Acknowledge' }))
  expect(await screen.findByRole('alert')).toHaveTextContent('This was not done. The server cannot be reached.')
  expect(screen.getByRole('button', { name: 'Acknowledge' })).toBeEnabled()
})

test('closing as not a bloom asks what it was instead', async () => {
  const asked = fakeServer({
    'GET /alerts/41': () => reply(endpoints.alert, byInes()),
    'POST /alerts/41/close': () => reply(endpoints.closeAlert, anAlert({ state: 'closed', outcome: 'not a bloom', cause: 'glint', closedAt: '2026-06-11T04:00:00Z', version: 5 })),
  })
  await desk()
  await userEvent.click(screen.getByRole('button', { name: 'Close' }))
  await userEvent.click(screen.getByLabelText('not a bloom'))
  const closeIt = () => userEvent.click(screen.getAllByRole('button', { name: 'Close' }).at(-1) ?? document.body)
  await closeIt()
  expect(await screen.findByText(/Say what it was instead/)).toBeInTheDocument()
  expect(asked.some((a) => a.method === 'POST')).toBe(false)
  await userEvent.click(screen.getByLabelText('glint'))
  await closeIt()
  expect(await screen.findByText(/not a bloom \(glint\)/)).toBeInTheDocument()
})

test('a researcher may add a note and is told who acknowledges', async () => {
  fakeServer({ 'GET /alerts/41': () => reply(endpoints.alert, anAlert()) })
  await desk({ ...officer, roles: ['researcher'] })
  expect(screen.queryByRole('button', { name: 'Acknowledge' })).not.toBeInTheDocument()
  expect(screen.getByText(/An officer acknowledges alerts/)).toBeInTheDocument()
  expect(screen.getByRole('button', { name: 'Add the note' })).toBeDisabled()
})
