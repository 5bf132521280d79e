import { endpoints } from '../../server/contract/endpoints.ts'
import type { RawFile } from '../../server/contract/files.ts'
import { problemFrom, unreachable, ApiProblem } from './api-problem.ts'
import { hadSession, untilSignedIn } from './session-gate.ts'
import { urlOf } from './url-of.ts'

export interface UploadProgress {
  sent: number
  total: number
}

interface UploadOptions {
  id: string
  file: File
  signal: AbortSignal
  onProgress: (progress: UploadProgress) => void
}

/** Sends one file as multipart, telling how far it is. XMLHttpRequest, because fetch tells nothing of what it sent. */
export async function upload(
  name: 'uploadToEntry' | 'uploadToRun',
  options: UploadOptions,
): Promise<RawFile> {
  try {
    return await sendOnce(name, options)
  } catch (error) {
    if (!(error instanceof ApiProblem) || error.status !== 401 || !hadSession()) throw error
    await untilSignedIn()
    return upload(name, options)
  }
}

function sendOnce(name: 'uploadToEntry' | 'uploadToRun', { id, file, signal, onProgress }: UploadOptions) {
  return new Promise<RawFile>((resolve, reject) => {
    const request = new XMLHttpRequest()
    request.open('POST', urlOf(name, { id }))
    request.responseType = 'json'
    request.setRequestHeader('Accept', 'application/json')
    request.setRequestHeader('X-File-Size', String(file.size))
    request.upload.onprogress = ({ loaded }) =>
      onProgress({ sent: Math.min(loaded, file.size), total: file.size })
    request.onerror = () => reject(unreachable())
    request.onabort = () => reject(new DOMException('The upload was stopped.', 'AbortError'))
    request.onload = () => {
      if (request.status !== endpoints[name].status)
        return reject(problemFrom(request.status, request.response))
      const parsed = endpoints[name].reply.safeParse(request.response)
      if (parsed.success) resolve(parsed.data)
      else reject(problemFrom(502, null))
    }
    signal.addEventListener('abort', () => request.abort(), { once: true })
    const form = new FormData()
    form.append('file', file, file.name)
    request.send(form)
  })
}
