import { useQuery } from '@tanstack/react-query'
import { regionQuery } from '../../api/regions'
import { SectionHead } from '../../components/ui/page'

/** Whom to call, with numbers to tap. */
export function Contacts({ regionId }: { regionId: number }) {
  const contacts = useQuery(regionQuery(regionId)).data?.contacts
  if (!contacts || contacts.length === 0) return null
  return (
    <section aria-label="Contacts">
      <SectionHead>Contacts</SectionHead>
      <ul>
        {contacts.map((contact) => (
          <li key={`${contact.name} ${contact.phone}`} className="flex items-center justify-between gap-4 border-b border-rule py-2.5">
            <span>
              <span className="block text-small font-strong">{contact.name}</span>
              {contact.note && <span className="block text-small text-ink2">{contact.note}</span>}
            </span>
            {contact.phone && (
              <a
                href={`tel:${contact.phone.replace(/\s/g, '')}`}
                className="fig link grid min-h-11 place-items-center whitespace-nowrap max-tab:border max-tab:border-accent max-tab:px-4 max-tab:no-underline tab:min-h-0"
              >
                {contact.phone}
              </a>
            )}
          </li>
        ))}
      </ul>
    </section>
  )
}
