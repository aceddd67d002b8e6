import { paths } from '../../../shared/paths'
import { ButtonLink } from '../../components/ui/button'
import { Page, Statement } from '../../components/ui/page'

export function Component() {
  return (
    <Page title="No such page">
      <Statement detail="The address may have been cut short in a letter, or what it led to was retired.">There is no page at this address.</Statement>
      <div>
        <ButtonLink kind="filled" to={paths.today.to()}>
          Go to Today
        </ButtonLink>
      </div>
    </Page>
  )
}
