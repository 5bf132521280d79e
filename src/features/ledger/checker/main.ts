import './without-eval.ts'
import { parseJson, type Json } from '../../../../server/ledger-format/canonical-json.ts'
import {
  verifyBundle,
  type BundleSource,
  type VerifyOptions,
} from '../../../../server/ledger-format/verify/index.ts'
import { reportNodes } from './report-view.ts'

function byId<T extends HTMLElement>(id: string, kind: new () => T): T {
  const node = document.getElementById(id)
  if (!(node instanceof kind)) throw new Error(`The page lacks its ${id}.`)
  return node
}

const form = byId('form', HTMLFormElement)
const progress = byId('progress', HTMLElement)
const section = byId('report', HTMLElement)
const button = form.querySelector('button')

const chosen = (id: string): File | null => byId(id, HTMLInputElement).files?.[0] ?? null

const bytesOf = async (blob: Blob) => new Uint8Array(await blob.arrayBuffer())

async function jsonOf(id: string): Promise<Json | undefined> {
  const file = chosen(id)
  if (!file) return undefined
  try {
    return parseJson(await bytesOf(file))
  } catch (error) {
    throw new Error(`${file.name} cannot be read as JSON: ${(error as Error).message}`, { cause: error })
  }
}

const megabytes = (bytes: number) => (bytes / 1e6).toFixed(1)

/** Reads pieces of a file as the checks ask for them, and says how far it has come. */
function sourceOf(file: File): BundleSource {
  return {
    size: file.size,
    read: (offset, length) => {
      progress.textContent = `Reading: ${megabytes(offset)} of ${megabytes(file.size)} MB`
      return bytesOf(file.slice(offset, offset + length))
    },
  }
}

async function optionsOf(): Promise<VerifyOptions> {
  const [anchors, head, consistency] = await Promise.all(['anchors', 'head', 'consistency'].map(jsonOf))
  const crl = chosen('crl')
  return { anchors, head, consistency, crl: crl ? await bytesOf(crl) : undefined }
}

async function check(): Promise<void> {
  const bundle = chosen('bundle')
  if (!bundle) throw new Error('Choose a bundle first.')
  const report = await verifyBundle(sourceOf(bundle), await optionsOf())
  section.replaceChildren(...reportNodes(report))
  section.hidden = false
  byId('verdict', HTMLElement).focus()
}

form.addEventListener('submit', (event) => {
  event.preventDefault()
  section.hidden = true
  progress.textContent = 'Reading…'
  if (button) button.disabled = true
  void check()
    .then(
      () => (progress.textContent = 'Checked.'),
      (error: unknown) => (progress.textContent = `Not checked: ${(error as Error).message}`),
    )
    .finally(() => {
      if (button) button.disabled = false
    })
})
