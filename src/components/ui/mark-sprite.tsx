import sprite from '../../static/marks.svg?raw'

/** The ten marks as symbols, once in the page; `Mark` and the map refer to them by name. */
export function MarkSprite() {
  return <div aria-hidden className="absolute size-0 overflow-hidden" dangerouslySetInnerHTML={{ __html: sprite }} />
}
