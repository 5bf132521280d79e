import type { CSSProperties, ReactNode } from 'react'
import { Digest } from './digest.tsx'

export type Station = {
  name: string
  state: 'done' | 'todo' | 'returned'
  drawing: 'signature' | 'arrow' | 'half' | 'full'
  /** Who, when, short key or digest, a line each; for a station to come, one line on what it will need. */
  lines: ReactNode[]
  /** Draws the mark and the eight digits under the lines. */
  sha256?: string
  /** The step the work stands at. */
  current?: boolean
}

/** An ordered line of stations: solid as far as the work has come, dashed beyond. */
export function SealLine({
  label,
  stations,
  justDone,
  across,
}: {
  label: string
  stations: Station[]
  /** Plays the line filling left to right, once. */
  justDone?: boolean
  /** Words across the stations to come: "not witnessed". */
  across?: string
}) {
  return (
    <ol
      className="hs-seal"
      aria-label={label}
      data-just-done={justDone ? '' : undefined}
      style={{ '--hs-stations': stations.length } as CSSProperties}
    >
      {stations.map((station, at) => (
        <StationItem
          key={station.name}
          station={station}
          at={at}
          across={firstToDo(stations) === at ? across : undefined}
        />
      ))}
    </ol>
  )
}

function firstToDo(stations: Station[]): number {
  return stations.findIndex((station) => station.state === 'todo')
}

function StationItem({ station, at, across }: { station: Station; at: number; across?: string }) {
  return (
    <li
      data-state={station.state}
      aria-current={station.current ? 'step' : undefined}
      style={{ '--hs-station-index': at } as CSSProperties}
    >
      <span className="hs-station">
        <StationDrawing station={station} />
      </span>
      {across && <span className="hs-seal-across">{across}</span>}
      <b>{station.name}</b>
      {station.state === 'todo' && <span className="hs-only-spoken">, still to come</span>}
      {station.lines.map((line, each) => (
        <span key={each} className={each === 0 ? 'hs-seal-first' : 'hs-quiet'}>
          {line}
        </span>
      ))}
      {station.sha256 && <Digest sha256={station.sha256} size={30} />}
    </li>
  )
}

const frame = 'M1.5 1.5H21.5V21.5H1.5Z'

function StationDrawing({ station }: { station: Station }) {
  return (
    <svg width="23" height="23" viewBox="0 0 23 23" aria-hidden>
      {station.state === 'todo' ? <path strokeDasharray="3 2" d={frame} /> : <Done station={station} />}
    </svg>
  )
}

function Done({ station }: { station: Station }) {
  if (station.state === 'returned') return <path d={frame + 'M18 11.5H6M10.5 7L6 11.5L10.5 16'} />
  switch (station.drawing) {
    case 'signature':
      return <path d={frame + 'M5 15C8 6 10 6 10 12S13 17 18 8'} />
    case 'arrow':
      return <path d={frame + 'M5 11.5H17M12.5 7L17 11.5L12.5 16'} />
    case 'half':
      return (
        <>
          <path className="hs-station-glass" d="M1.5 1.5H21.5L1.5 21.5Z" />
          <path d={frame} />
        </>
      )
    case 'full':
      return (
        <>
          <path className="hs-station-full" d={frame} />
          <path className="hs-station-light" d="M3 20L20 3" />
        </>
      )
  }
}
