import { PageFrame } from '@/components/shell/page-frame'
import { PageHeading } from '@/components/shell/page-heading'

export default function ReportNotFound() {
  return (
    <PageFrame isNarrow>
      <PageHeading
        title="There is no report at this address"
        lead="Perhaps part of the address was lost on the way. Copy it once more, whole, or ask whoever sent it to you."
      />
    </PageFrame>
  )
}
