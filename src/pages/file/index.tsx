import { useQuery } from '@tanstack/react-query'
import { Link, useParams } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { OffingFile } from '../../../shared/schemas/files'
import { useMe } from '../../api/auth'
import { fileQuery } from '../../api/files'
import { Failure } from '../../components/ui/failure'
import { Message } from '../../components/ui/message'
import { Page, Statement } from '../../components/ui/page'
import { Progress } from '../../components/ui/progress'
import { Waiting } from '../../components/ui/waiting'
import { megabytes, shortChecksum } from '../../lib/format'
import { ConfirmFeed } from './confirm-feed'
import { DeleteFile } from './delete-file'
import { DerivablePart } from './derivable-part'
import { FiguresPart } from './figures-part'
import { FileContents } from './file-contents'
import { fileSentence } from './file-sentence'
import { LayersPart } from './layers-part'
import { mayDeleteFile } from './may-delete-file'
import { MissedPart } from './missed-part'
import { RefusedPart } from './refused-part'
import { ReplacedPart } from './replaced-part'
import { formatWords } from './understood-rows'

export function Component() {
  const id = Number(useParams()['id'])
  const file = useQuery(fileQuery(id))
  return (
    <Page title={file.data?.name ?? 'File'}>
      {file.isPending && <Waiting lines={5} />}
      {file.error && <Failure error={file.error} onRetry={() => void file.refetch()} />}
      {file.data && <FileParts key={id} file={file.data} />}
    </Page>
  )
}

function FileParts({ file }: { file: OffingFile }) {
  const me = useMe()
  const { statement, detail } = fileSentence(file)
  const proposal = file.status === 'waiting' ? file.proposal : null
  return (
    <>
      <Statement above={<WhichFile file={file} />} detail={detail}>
        {statement}
      </Statement>
      {file.progress && file.status === 'processing' && <Progress done={file.progress.done} total={file.progress.total} label="Reading" unit="layers" />}
      {file.refusal && <RefusedPart refusal={file.refusal} />}
      <ReplacedPart file={file} />
      {file.report?.warnings.map((warning) => (
        <Message key={warning}>{warning}</Message>
      ))}
      {file.status === 'waiting' && <MissedPart missed={file.report?.missed ?? []} />}
      {proposal && <ConfirmFeed file={file} proposal={proposal} />}
      {file.report && !proposal ? (
        <FileContents file={file} report={file.report}>
          <Given file={file} />
        </FileContents>
      ) : (
        <Given file={file} />
      )}
      {mayDeleteFile(me, file) && <DeleteFile file={file} />}
    </>
  )
}

/** What came of the file: layers, figures, and what its bands can give besides. */
function Given({ file }: { file: OffingFile }) {
  return (
    <>
      <LayersPart file={file} />
      <FiguresPart file={file} />
      {file.status === 'processed' && <DerivablePart file={file} />}
    </>
  )
}

function WhichFile({ file }: { file: OffingFile }) {
  return (
    <>
      <Link className="link font-strong" to={paths.layers.to()}>
        Files
      </Link>{' '}
      <span className="fig break-all">
        {file.name}, {megabytes(file.bytes)}
        {file.report && `, ${formatWords(file.report.format)}`}
        {file.checksum.startsWith('not-kept-') ? (
          ', not kept'
        ) : (
          <>
            , sha256 <span title={file.checksum}>{shortChecksum(file.checksum)}</span>
          </>
        )}
      </span>
    </>
  )
}
