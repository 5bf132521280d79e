import { createHash } from 'node:crypto'
import { closeSync, fstatSync, openSync, readFileSync, readSync } from 'node:fs'
import { parseJson, type Json } from './ledger-format/canonical-json.ts'
import type { Digester } from './ledger-format/digest.ts'
import {
  exitCodes,
  reportText,
  verifyBundle,
  type BundleSource,
  type VerifyOptions,
} from './ledger-format/verify/index.ts'

const usage =
  'usage: npm run verify -- BUNDLE.zip [--anchors FILE] [--head FILE [--consistency FILE]] [--crl FILE] [--json]'

interface Arguments {
  bundle: string
  json: boolean
  options: VerifyOptions
}

/**
 * `npm run verify`: checks a bundle and writes the report to stdout, or the JSON answer with `--json`.
 * @returns the exit code: 0 holds, 1 something is false, 3 something is missing, 2 usage
 */
export async function runVerify(argv: readonly string[]): Promise<number> {
  let given: Arguments
  let file: number
  try {
    given = readArguments(argv)
    file = openSync(given.bundle, 'r')
    if (!fstatSync(file).isFile()) throw new Error(`${given.bundle} is not a file.`)
  } catch (error) {
    process.stderr.write(`${(error as Error).message}\n${usage}\n`)
    return 2
  }
  try {
    const report = await verifyBundle(fileSource(file), { ...given.options, digester: nodeDigester })
    const { verdict, anchors, checks } = report
    process.stdout.write(
      given.json ? `${JSON.stringify({ verdict, anchors, checks })}\n` : reportText(report),
    )
    return exitCodes[verdict]
  } finally {
    closeSync(file)
  }
}

function readArguments(argv: readonly string[]): Arguments {
  const files = new Map<string, string>()
  const bundles: string[] = []
  let json = false
  const rest = [...argv]
  for (let argument = rest.shift(); argument !== undefined; argument = rest.shift()) {
    if (argument === '--json') json = true
    else if (['--anchors', '--head', '--consistency', '--crl'].includes(argument)) {
      const path = rest.shift()
      if (path === undefined || files.has(argument)) throw new Error(`${argument} needs one file.`)
      files.set(argument, path)
    } else if (argument.startsWith('-')) throw new Error(`Unknown option ${argument}.`)
    else bundles.push(argument)
  }
  const [bundle, ...more] = bundles
  if (bundle === undefined || more.length > 0) throw new Error('Give one bundle.')
  if (files.has('--consistency') && !files.has('--head')) throw new Error('--consistency needs --head.')
  const crl = files.get('--crl')
  return {
    bundle,
    json,
    options: {
      anchors: readJson(files.get('--anchors')),
      head: readJson(files.get('--head')),
      consistency: readJson(files.get('--consistency')),
      crl: crl === undefined ? undefined : new Uint8Array(readFileSync(crl)),
    },
  }
}

function readJson(path: string | undefined): Json | undefined {
  if (path === undefined) return undefined
  try {
    return parseJson(new Uint8Array(readFileSync(path)))
  } catch (error) {
    throw new Error(`${path} cannot be read as JSON: ${(error as Error).message}`, { cause: error })
  }
}

function fileSource(file: number): BundleSource {
  return {
    size: fstatSync(file).size,
    read: (offset, length) => {
      const bytes = new Uint8Array(length)
      for (let done = 0; done < length;) {
        const count = readSync(file, bytes, done, length - done, offset + done)
        if (count === 0) throw new Error('The bundle became shorter while it was read.')
        done += count
      }
      return bytes
    },
  }
}

const nodeDigester: Digester = (algorithm) => {
  const hash = createHash(algorithm)
  return { update: (bytes) => void hash.update(bytes), hex: () => hash.digest('hex') }
}
