import type { Region } from '../../../shared/schemas/regions'
import { SectionHead } from '../../components/ui/page'

/** Whom to call about this water. */
export function ContactsPart({ region }: { region: Region }) {
  return (
    <section>
      <SectionHead>Contacts</SectionHead>
      {region.contacts.length === 0 && <p className="py-3 text-small text-ink2">Nobody yet. Edit the region to say whom to call about this water.</p>}
      <ul>
        {region.contacts.map((contact, index) => (
          <li key={index} className="flex min-h-13 items-center justify-between gap-4 border-b border-rule py-2">
            <div>
              <div className="font-strong">{contact.name}</div>
              {contact.note && <div className="text-small text-ink2">{contact.note}</div>}
            </div>
            {contact.phone && (
              <a className="link fig inline-flex min-h-11 items-center whitespace-nowrap" href={`tel:${contact.phone.replace(/[^+\d]/g, '')}`}>
                {contact.phone}
              </a>
            )}
          </li>
        ))}
      </ul>
    </section>
  )
}
