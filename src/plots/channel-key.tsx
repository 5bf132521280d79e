import type { ReactNode } from 'react'
import { isOpen, marksPath, type Role } from './marks.ts'

export type Channel = 1 | 2 | 3 | 4

function markClass(role: Role): string {
  return `hs-mark hs-mark-${role}${isOpen(role) ? ' hs-mark-open' : ''}`
}

/** The marked line sample that stands for a series wherever it is named: the legend, placed in the text. */
export function RoleKey({ role, children, width = 30 }: { role: Role; children: ReactNode; width?: number }) {
  return (
    <span className="hs-channel">
      <svg className="hs-channel-key" width={width} height="12" viewBox={`0 0 ${width} 12`} aria-hidden>
        <path className={`hs-series hs-role-${role}`} d={`M0 6H${width}`} />
        <path className={markClass(role)} d={marksPath(role, [{ x: width / 2, y: 6 }], 3.6)} />
      </svg>
      <span>{children}</span>
    </span>
  )
}

export function ChannelKey({ channel, children }: { channel: Channel; children: ReactNode }) {
  return <RoleKey role={`channel-${channel}`}>{children}</RoleKey>
}

/** The markers of some channels alone, for a narrow column. */
export function ChannelMarks({ channels }: { channels: Channel[] }) {
  return (
    <svg width={channels.length * 18} height="12" role="img" aria-label={`Channels ${channels.join(', ')}`}>
      {channels.map((channel, at) => (
        <path
          key={channel}
          className={markClass(`channel-${channel}`)}
          d={marksPath(`channel-${channel}`, [{ x: 7 + 18 * at, y: 6 }], 4)}
        />
      ))}
    </svg>
  )
}
