/** The square mark of faults: files, forms, feeds. Never ember. */
export function FaultMark() {
  return (
    <span aria-hidden className="grid size-4.5 shrink-0 place-items-center bg-ink text-fine font-heading text-paper">
      !
    </span>
  )
}
