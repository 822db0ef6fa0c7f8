import { ButtonLink } from '@/components/ui/button'
import { MessagePage } from '@/components/shell/page-states'

export default function NotFound() {
  return (
    <MessagePage
      title="Nothing is here"
      actions={
        <ButtonLink href="/circuits" look="filled" size="bay">
          To Circuits
        </ButtonLink>
      }
    >
      <p>The address leads nowhere, or to something that is not this shop's.</p>
    </MessagePage>
  )
}
