import { sizeText } from '../../lib/format-quantity.ts'
import { TextButton } from '../../ui/button.tsx'
import { Message } from '../../ui/message.tsx'
import { Progress, timeLeft } from '../../ui/progress.tsx'
import type { Upload, UploadList } from './upload-list.ts'

/** Files on their way, a line each: how far, how fast, how long yet, and Stop. */
export function UploadLines({ list, uploads }: { list: UploadList; uploads: readonly Upload[] }) {
  return uploads.map((upload) => <UploadLine key={upload.key} upload={upload} list={list} />)
}

function UploadLine({ upload, list }: { upload: Upload; list: UploadList }) {
  const { key, name, size, sent, state, sentence } = upload
  if (state === 'refused' || state === 'stopped') {
    return (
      <Message
        kind={state === 'refused' ? 'fault' : 'plain'}
        title={state === 'refused' ? `${name} was not taken.` : `${name} was stopped.`}
        actions={<TextButton onClick={() => list.dismiss(key)}>Dismiss</TextButton>}
      >
        {sentence ?? 'Nothing of it was kept.'}
      </Message>
    )
  }
  return (
    <div className="hs-upload">
      <p>
        {name} <span className="hs-quiet">{sizeText(size)}</span>{' '}
        {state !== 'checking' && <TextButton onClick={() => list.stop(key)}>Stop</TextButton>}
      </p>
      <Progress
        label={`Upload of ${name}`}
        share={state === 'waiting' ? null : sent / size}
        words={words(upload)}
      />
    </div>
  )
}

function words({ state, sent, size, rate }: Upload): string {
  if (state === 'waiting') return 'waits for the file before it'
  if (state === 'checking') return 'arrived; its bytes are compared with the store’s copy'
  const speed = rate === null ? null : `${sizeText(Math.round(rate))}/s`
  return [sizeText(sent), speed, timeLeft(sent, size, rate)].filter(Boolean).join(', ')
}
