import { Waiting } from '../ui/waiting'

export function PageOnItsWay() {
  return (
    <main className="mx-auto max-w-[1440px] px-4 py-8 tab:px-8">
      <Waiting label="The page is on its way" />
    </main>
  )
}
