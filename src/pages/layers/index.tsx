import { useState } from 'react'
import { paths } from '../../../shared/paths'
import { useCan } from '../../api/auth'
import { ButtonLink } from '../../components/ui/button'
import { Choice } from '../../components/ui/choice'
import { Page, Statement } from '../../components/ui/page'
import { FileList } from './file-list'
import { LayerList } from './layer-list'
import { UploadPart } from './upload-part'
import { useFileSentence } from './use-file-sentence'

const parts = [
  { value: 'files', label: 'Files' },
  { value: 'layers', label: 'Layers by feed' },
] as const

export function Component() {
  const [part, setPart] = useState<'files' | 'layers'>('files')
  const mayUpload = useCan('file:upload')
  const sentence = useFileSentence()
  return (
    <Page title="Layers">
      <style>{'[data-upload-note] { display: none }'}</style>
      <Statement detail={sentence.detail} actions={<ButtonLink to={paths.layerMap.to()}>Day by day on the map</ButtonLink>}>{sentence.statement}</Statement>
      {mayUpload && <UploadPart />}
      <div className="grid grid-cols-[minmax(0,1fr)] gap-3">
        <Choice label="What is listed" options={parts} value={part} onChange={setPart} />
        {part === 'files' ? <FileList /> : <LayerList />}
      </div>
    </Page>
  )
}
