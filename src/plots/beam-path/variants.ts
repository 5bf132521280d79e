/** Set-ups on the 24 px hole pitch as data: where light runs, what stands in it, and where the words go. */
export type BeamVariant = 'hbt' | 'her' | 'dip' | 'pol'

/** Places for words and figures, in path order. `extra` is the figure derived last: accidentals, efficiency and so on. */
export type NodeId =
  | 'source'
  | 'filter'
  | 'splitter'
  | 'delay'
  | 'analysers'
  | 'herald'
  | 'detector-1'
  | 'detector-2'
  | 'coincidence'
  | 'extra'

export type PartKind =
  | 'source'
  | 'filter'
  | 'density'
  | 'crystal'
  | 'splitter'
  | 'mirror'
  | 'delay'
  | 'analyser'
  | 'detector'
  | 'coincidence'
  | 'shutter'

export type Point = [x: number, y: number]
export type Light = { channel: 0 | 1 | 2 | 3; points: Point[] }
export type Part = { kind: PartKind; at: Point; turn?: number; channel?: 1 | 2 | 3; analyser?: 0 | 1 }
export type Slot = { id: NodeId; at: Point }
export type Drawing = {
  size: [width: number, height: number]
  wires: Point[][]
  lights: Light[]
  parts: Part[]
  slots: Slot[]
  /** Without light: the shutter stands here, and the first light ends at it. */
  shutter: { at: Point; turn?: number; insteadOf?: PartKind }
}

export const wide: Record<BeamVariant, Drawing> = {
  hbt: {
    size: [1040, 192],
    wires: [
      [
        [568, 72],
        [690, 72],
        [744, 102],
      ],
      [
        [568, 144],
        [690, 144],
        [744, 114],
      ],
    ],
    lights: [
      {
        channel: 0,
        points: [
          [73, 72],
          [343, 72],
        ],
      },
      {
        channel: 1,
        points: [
          [377, 72],
          [547, 72],
        ],
      },
      {
        channel: 2,
        points: [
          [360, 89],
          [360, 144],
          [547, 144],
        ],
      },
    ],
    parts: [
      { kind: 'source', at: [60, 72] },
      { kind: 'filter', at: [156, 72] },
      { kind: 'density', at: [240, 72] },
      { kind: 'splitter', at: [360, 72] },
      { kind: 'mirror', at: [360, 144], turn: 45 },
      { kind: 'detector', at: [556, 72], channel: 1 },
      { kind: 'detector', at: [556, 144], channel: 2 },
      { kind: 'coincidence', at: [760, 108] },
    ],
    slots: [
      { id: 'source', at: [40, 116] },
      { id: 'filter', at: [204, 116] },
      { id: 'splitter', at: [388, 112] },
      { id: 'detector-1', at: [582, 38] },
      { id: 'detector-2', at: [582, 164] },
      { id: 'coincidence', at: [796, 84] },
      { id: 'extra', at: [796, 128] },
    ],
    shutter: { at: [240, 72], insteadOf: 'density' },
  },
  her: {
    size: [1040, 216],
    wires: [
      [
        [568, 60],
        [690, 60],
        [746, 100],
      ],
      [
        [568, 132],
        [690, 132],
        [744, 118],
      ],
      [
        [568, 192],
        [700, 192],
        [752, 128],
      ],
    ],
    lights: [
      {
        channel: 0,
        points: [
          [73, 60],
          [223, 60],
        ],
      },
      {
        channel: 3,
        points: [
          [257, 60],
          [547, 60],
        ],
      },
      {
        channel: 0,
        points: [
          [240, 77],
          [240, 132],
          [383, 132],
        ],
      },
      {
        channel: 1,
        points: [
          [417, 132],
          [547, 132],
        ],
      },
      {
        channel: 2,
        points: [
          [400, 149],
          [400, 192],
          [547, 192],
        ],
      },
    ],
    parts: [
      { kind: 'source', at: [60, 60] },
      { kind: 'crystal', at: [150, 60] },
      { kind: 'splitter', at: [240, 60] },
      { kind: 'mirror', at: [240, 132], turn: 45 },
      { kind: 'filter', at: [320, 132] },
      { kind: 'splitter', at: [400, 132] },
      { kind: 'mirror', at: [400, 192], turn: 45 },
      { kind: 'detector', at: [556, 60], channel: 3 },
      { kind: 'detector', at: [556, 132], channel: 1 },
      { kind: 'detector', at: [556, 192], channel: 2 },
      { kind: 'coincidence', at: [762, 112] },
    ],
    slots: [
      { id: 'source', at: [40, 104] },
      { id: 'filter', at: [276, 170] },
      { id: 'herald', at: [582, 28] },
      { id: 'detector-1', at: [582, 100] },
      { id: 'detector-2', at: [582, 162] },
      { id: 'coincidence', at: [796, 84] },
      { id: 'extra', at: [796, 128] },
    ],
    shutter: { at: [195, 60] },
  },
  dip: {
    size: [1040, 192],
    wires: [
      [
        [568, 66],
        [690, 66],
        [744, 102],
      ],
      [
        [568, 150],
        [690, 150],
        [744, 114],
      ],
    ],
    lights: [
      {
        channel: 0,
        points: [
          [73, 108],
          [134, 108],
        ],
      },
      {
        channel: 0,
        points: [
          [166, 104],
          [216, 60],
          [340, 60],
          [418, 102],
        ],
      },
      {
        channel: 0,
        points: [
          [166, 112],
          [216, 156],
          [340, 156],
          [418, 114],
        ],
      },
      {
        channel: 1,
        points: [
          [450, 102],
          [500, 66],
          [547, 66],
        ],
      },
      {
        channel: 2,
        points: [
          [450, 114],
          [500, 150],
          [547, 150],
        ],
      },
    ],
    parts: [
      { kind: 'source', at: [60, 108] },
      { kind: 'crystal', at: [150, 108] },
      { kind: 'filter', at: [250, 60] },
      { kind: 'delay', at: [270, 156] },
      { kind: 'splitter', at: [434, 108], turn: -45 },
      { kind: 'detector', at: [556, 66], channel: 1 },
      { kind: 'detector', at: [556, 150], channel: 2 },
      { kind: 'coincidence', at: [760, 108] },
    ],
    slots: [
      { id: 'source', at: [40, 152] },
      { id: 'filter', at: [232, 92] },
      { id: 'delay', at: [300, 174] },
      { id: 'detector-1', at: [582, 34] },
      { id: 'detector-2', at: [582, 170] },
      { id: 'coincidence', at: [796, 84] },
      { id: 'extra', at: [796, 128] },
    ],
    shutter: { at: [104, 108] },
  },
  pol: {
    size: [1040, 192],
    wires: [
      [
        [568, 66],
        [690, 66],
        [744, 102],
      ],
      [
        [568, 150],
        [690, 150],
        [744, 114],
      ],
    ],
    lights: [
      {
        channel: 0,
        points: [
          [73, 108],
          [134, 108],
        ],
      },
      {
        channel: 1,
        points: [
          [166, 104],
          [216, 66],
          [547, 66],
        ],
      },
      {
        channel: 2,
        points: [
          [166, 112],
          [216, 150],
          [547, 150],
        ],
      },
    ],
    parts: [
      { kind: 'source', at: [60, 108] },
      { kind: 'crystal', at: [150, 108] },
      { kind: 'filter', at: [280, 66] },
      { kind: 'filter', at: [280, 150] },
      { kind: 'analyser', at: [400, 66], analyser: 0 },
      { kind: 'analyser', at: [400, 150], analyser: 1 },
      { kind: 'detector', at: [556, 66], channel: 1 },
      { kind: 'detector', at: [556, 150], channel: 2 },
      { kind: 'coincidence', at: [760, 108] },
    ],
    slots: [
      { id: 'source', at: [40, 152] },
      { id: 'filter', at: [262, 104] },
      { id: 'analysers', at: [424, 98] },
      { id: 'detector-1', at: [582, 34] },
      { id: 'detector-2', at: [582, 170] },
      { id: 'coincidence', at: [796, 84] },
      { id: 'extra', at: [796, 128] },
    ],
    shutter: { at: [104, 108] },
  },
}
