import type { Alert } from '../../../shared/schemas/alerts'
import { useWide } from '../../hooks/use-wide'
import { ActDialogs } from './act-dialogs'
import { ActError } from './act-error'
import { Acts } from './acts'
import { AlertHead } from './alert-head'
import { Cautions } from './cautions'
import { Contacts } from './contacts'
import { NoteForm } from './note-form'
import { PhoneBar } from './phone-bar'
import { SeriesPart } from './series-part'
import { Timeline } from './timeline'
import { useActs } from './use-acts'
import { Where } from './where'
import { Why } from './why'

/** The whole sheet of an alert, in the order a person decides by: what, caution, why, where, what happened, what to do. */
export function AlertSheet({ alert }: { alert: Alert }) {
  const wide = useWide()
  const acts = useActs(alert)
  return (
    <>
      <AlertHead alert={alert} actions={wide && <Acts alert={alert} acts={acts} />} />
      <ActError acts={acts} />
      <Cautions cautions={alert.cautions} />
      <Why alert={alert} />
      <div className="grid gap-x-9 gap-y-8 border-t border-ink pt-5 desk:grid-cols-[minmax(0,1.25fr)_minmax(0,1fr)]">
        <Where alert={alert} />
        <div className="grid content-start gap-9">
          <Timeline alert={alert} />
          <NoteForm alert={alert} acts={acts} />
          <Contacts regionId={alert.regionId} />
        </div>
      </div>
      <SeriesPart alert={alert} />
      {!wide && <PhoneBar alert={alert} acts={acts} />}
      <ActDialogs alert={alert} acts={acts} />
    </>
  )
}
