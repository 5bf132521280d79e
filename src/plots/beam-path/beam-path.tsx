import type { KeyboardEvent } from 'react'
import { PartDrawing } from './parts.tsx'
import { tall } from './tall-variants.ts'
import { wide, type BeamVariant, type Drawing, type NodeId, type Point, type Slot } from './variants.ts'

export type BeamNode = {
  label: string
  /** Set low after the label, as the 1 of W₁, and what follows it. */
  sub?: string
  labelEnd?: string
  /** The figure, and beside it smaller its uncertainty and unit. */
  figure?: string
  more?: string
  /** What is wrong at this node, in words. */
  fault?: string
}

export type BeamPathProps = {
  variant: BeamVariant
  nodes: Partial<Record<NodeId, BeamNode>>
  /** `live`: figures change in place. `frozen`: as it was in a run. `no-light`: shutter closed, detectors empty. */
  state?: 'live' | 'frozen' | 'no-light'
  /** Spoken name, which says what the drawing is frozen to: "Beam path of run R-0612, frozen at 11:30". */
  label: string
  /** Degrees of the two analysers. */
  angles?: [number, number]
  onNode?: (id: NodeId) => void
  selected?: NodeId
}

const joined = (points: Point[]) => points.map(([x, y], at) => `${at === 0 ? 'M' : 'L'}${x} ${y}`).join('')

/** A set-up on the table with its figures at their nodes; beside it a list in path order for those who hear it. */
export function BeamPath(props: BeamPathProps) {
  const { variant, nodes, state = 'live', label } = props
  return (
    <div className="hs-beam" data-light={state === 'no-light' ? 'none' : undefined}>
      <BeamDrawing {...props} drawing={wide[variant]} className="hs-beam-wide" />
      <BeamDrawing {...props} drawing={tall[variant]} className="hs-beam-tall" />
      <ol className="hs-only-spoken" aria-label={label}>
        {wide[variant].slots.map((slot) => {
          const node = nodes[slot.id]
          return node && <li key={slot.id}>{spoken(node)}</li>
        })}
        {state === 'no-light' && <li>The shutter is closed: no light.</li>}
      </ol>
    </div>
  )
}

/** The set-up alone with its shutter closed, for an empty place: no words, no figures. */
export function ClosedSetUp({ variant }: { variant: BeamVariant }) {
  const drawing = wide[variant]
  const [, height] = drawing.size
  return (
    <div className="hs-beam" data-light="none">
      <svg
        className="hs-beam-wide"
        data-bare=""
        viewBox={`20 30 800 ${height - 20}`}
        width="800"
        role="img"
        aria-label="Set-up with its shutter closed"
      >
        <Optics drawing={drawing} noLight />
      </svg>
    </div>
  )
}

/** The set-up in a corner of a template, drawn small with heavy lines. */
export function MiniBeam({ variant }: { variant: BeamVariant }) {
  const drawing = wide[variant]
  const half = ([x, y]: Point): Point => [x / 2, y]
  const small: Drawing = {
    ...drawing,
    wires: drawing.wires.map((wire) => wire.map(half)),
    lights: drawing.lights.map((light) => ({ ...light, points: light.points.map(half) })),
    parts: drawing.parts.map((part) => ({ ...part, at: half(part.at) })),
  }
  const [top, height] = variant === 'her' ? [36, 176] : [44, 130]
  return (
    <svg className="hs-mini" viewBox={`10 ${top} 396 ${height}`} aria-hidden>
      <Optics drawing={small} angles={[0, 22.5]} />
    </svg>
  )
}

function spoken(node: BeamNode): string {
  const name = [node.label + (node.sub ?? ''), node.labelEnd].filter(Boolean).join('')
  const figure = [node.figure, node.more].filter(Boolean).join(' ')
  return [name, figure].filter(Boolean).join(': ') + (node.fault ? `. ${node.fault}` : '')
}

function BeamDrawing(props: BeamPathProps & { drawing: Drawing; className: string }) {
  const { drawing, nodes, state, label, angles, onNode, selected, className } = props
  const [width, height] = drawing.size
  return (
    <svg
      className={className}
      viewBox={`0 0 ${width} ${height}`}
      width={width}
      height={height}
      role={onNode ? 'group' : undefined}
      aria-label={onNode ? label : undefined}
      aria-hidden={onNode ? undefined : true}
    >
      <Optics drawing={drawing} noLight={state === 'no-light'} angles={angles} />
      {drawing.slots.map((slot) => {
        const node = nodes[slot.id]
        return (
          node && (
            <Node key={slot.id} slot={slot} node={node} onNode={onNode} selected={selected === slot.id} />
          )
        )
      })}
    </svg>
  )
}

function Optics({
  drawing,
  noLight,
  angles = [0, 0],
}: {
  drawing: Drawing
  noLight?: boolean
  angles?: [number, number]
}) {
  const { wires, lights, parts, shutter } = drawing
  const standing = noLight ? parts.filter((part) => part.kind !== shutter.insteadOf) : parts
  return (
    <>
      {wires.map((wire) => (
        <path key={joined(wire)} className="hs-wire" d={joined(wire)} />
      ))}
      {lights.map((light, at) => {
        const cut = noLight && at === 0
        const points = cut ? [...light.points.slice(0, 1), shutter.at] : light.points
        return (
          <path
            key={at}
            className={`hs-light hs-light-${light.channel}`}
            d={joined(points)}
            data-after-shutter={noLight && !cut ? '' : undefined}
          />
        )
      })}
      {standing.map((part) => (
        <PartDrawing key={`${part.kind}${part.at}`} part={part} angle={angles[part.analyser ?? 0]} />
      ))}
      {noLight && <PartDrawing part={{ kind: 'shutter', at: shutter.at, turn: shutter.turn }} />}
    </>
  )
}

type NodeProps = { slot: Slot; node: BeamNode; onNode?: (id: NodeId) => void; selected: boolean }

/** Words and figure of one node; a button where something can be opened. The hit area is 46 px high, so that it keeps 44 when a phone shrinks it a little. */
function Node({ slot, node, onNode, selected }: NodeProps) {
  const [x, y] = slot.at
  const indent = node.fault ? 17 : 0
  const button = onNode && {
    role: 'button',
    tabIndex: 0,
    'aria-label': spoken(node),
    onClick: () => onNode(slot.id),
    onKeyDown: (event: KeyboardEvent) => {
      if (event.key !== 'Enter' && event.key !== ' ') return
      event.preventDefault()
      onNode(slot.id)
    },
  }
  return (
    <g
      className="hs-node"
      data-selected={selected ? '' : undefined}
      data-fault={node.fault ? '' : undefined}
      {...button}
    >
      <rect className="hs-hit" x={x - 8} y={y - 18} width={Math.max(88, hitWidth(node))} height="46" />
      {node.fault && (
        <path className="hs-node-fault" d={`M${x + 6} ${y - 10}l6 10.5h-12ZM${x + 6} ${y - 6.5}v3.5`} />
      )}
      <text className="hs-node-label" x={x + indent} y={y}>
        {node.label}
        {node.sub && (
          <tspan dy="3" fontSize="9">
            {node.sub}
          </tspan>
        )}
        {node.labelEnd && <tspan dy={node.sub ? -3 : undefined}>{node.labelEnd}</tspan>}
      </text>
      {node.figure && (
        <text className="hs-node-figure" x={x} y={y + 18}>
          {node.figure}
          {node.more && (
            <tspan className="hs-node-more" dx="4">
              {node.more}
            </tspan>
          )}
        </text>
      )}
    </g>
  )
}

/** A guess from the letters, wide enough for either line. */
function hitWidth(node: BeamNode): number {
  const label = (node.label + (node.sub ?? '') + (node.labelEnd ?? '')).length * 6.6
  const figure = (node.figure?.length ?? 0) * 9 + (node.more?.length ?? 0) * 7.2 + 4
  return Math.round(Math.max(label, figure)) + 24
}
