import { calculationEndpoints } from './calculations.ts'
import { entryEndpoints } from './entries.ts'
import { exportEndpoints } from './exports.ts'
import { fileEndpoints } from './files.ts'
import { ledgerEndpoints } from './ledger.ts'
import { notebookEndpoints } from './notebooks.ts'
import { peopleEndpoints } from './people.ts'
import { runEndpoints } from './runs.ts'
import { signatureEndpoints } from './signatures.ts'

/** The one table of the HTTP interface: server mounting, typed client and OpenAPI document are made from it. */
export const endpoints = {
  ...peopleEndpoints,
  ...notebookEndpoints,
  ...entryEndpoints,
  ...runEndpoints,
  ...fileEndpoints,
  ...calculationEndpoints,
  ...signatureEndpoints,
  ...ledgerEndpoints,
  ...exportEndpoints,
}

export type EndpointName = keyof typeof endpoints
