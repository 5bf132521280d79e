import type { Role } from '../../contract/common.ts'

/** Numeric account ids of the sign-in stand-in; the demo seed binds its people to them. */
export interface DemoAccount {
  accountId: number
  login: string
  name: string
  email: string
  role: Role
}

export const demoAccounts: readonly DemoAccount[] = [
  {
    accountId: 410001,
    login: 'maren',
    name: 'Maren Adeyemi',
    email: 'maren@ridgeway.example',
    role: 'experimentalist',
  },
  {
    accountId: 410002,
    login: 'teo',
    name: 'Teo Laukkanen',
    email: 'teo@ridgeway.example',
    role: 'experimentalist',
  },
  {
    accountId: 410003,
    login: 'farid',
    name: 'Dr Farid Shirvani',
    email: 'farid@ridgeway.example',
    role: 'supervisor',
  },
  {
    accountId: 410004,
    login: 'noor',
    name: 'Noor El-Amrani',
    email: 'noor@ridgeway.example',
    role: 'auditor',
  },
  {
    accountId: 410005,
    login: 'bram',
    name: 'Bram Oosterveld',
    email: 'bram@ridgeway.example',
    role: 'manager',
  },
]

/** The passphrase of every demo person's signing key; shown on the sign-in page of the demo only. */
export const demoPassphrase = 'ridgeway-demo-passphrase'
