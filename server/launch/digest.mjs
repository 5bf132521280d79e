import { createHash } from 'node:crypto'
import fs from 'node:fs'
import path from 'node:path'
import { root } from './root.mjs'

/** One digest over names and contents of files and folders of the checkout; what is not there counts for nothing. */
export function digestOf(places) {
  const hash = createHash('sha256')
  for (const file of places.flatMap(filesOf))
    hash
      .update(file)
      .update('\0')
      .update(fs.readFileSync(path.join(root, file)))
  return hash.digest('hex')
}

/** Files of a place, by their path in the checkout, in one order everywhere. */
function filesOf(place) {
  const full = path.join(root, place)
  if (!fs.existsSync(full)) return []
  if (!fs.statSync(full).isDirectory()) return [place]
  const inside = fs.readdirSync(full, { recursive: true }).map((name) => path.join(place, name))
  return inside.filter((name) => fs.statSync(path.join(root, name)).isFile()).sort()
}
