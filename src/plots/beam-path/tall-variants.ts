import type { BeamVariant, Drawing, Slot } from './variants.ts'

/** The phone's form of each set-up: light runs down at the left, words in one column, a row for each node. */
const column = 124
const rows = (ids: [Slot['id'], number][]): Slot[] => ids.map(([id, y]) => ({ id, at: [column, y] }))

export const tall: Record<BeamVariant, Drawing> = {
  hbt: {
    size: [300, 416],
    wires: [
      [
        [32, 260],
        [32, 318],
        [48, 342],
      ],
      [
        [84, 260],
        [84, 318],
        [64, 342],
      ],
    ],
    lights: [
      {
        channel: 0,
        points: [
          [32, 41],
          [32, 163],
        ],
      },
      {
        channel: 1,
        points: [
          [32, 197],
          [32, 232],
        ],
      },
      {
        channel: 2,
        points: [
          [49, 180],
          [84, 180],
          [84, 232],
        ],
      },
    ],
    parts: [
      { kind: 'source', at: [32, 28] },
      { kind: 'filter', at: [32, 84], turn: 90 },
      { kind: 'density', at: [32, 126], turn: 90 },
      { kind: 'splitter', at: [32, 180] },
      { kind: 'mirror', at: [84, 180], turn: 225 },
      { kind: 'detector', at: [32, 248], channel: 1, turn: 90 },
      { kind: 'detector', at: [84, 248], channel: 2, turn: 90 },
      { kind: 'coincidence', at: [56, 356] },
    ],
    slots: rows([
      ['source', 25],
      ['filter', 84],
      ['splitter', 169],
      ['detector-1', 229],
      ['detector-2', 281],
      ['coincidence', 337],
      ['extra', 387],
    ]),
    shutter: { at: [32, 126], turn: 90, insteadOf: 'density' },
  },
  her: {
    size: [300, 490],
    wires: [
      [
        [20, 322],
        [20, 380],
        [44, 410],
      ],
      [
        [60, 322],
        [60, 403],
      ],
      [
        [100, 322],
        [100, 380],
        [76, 410],
      ],
    ],
    lights: [
      {
        channel: 0,
        points: [
          [20, 41],
          [20, 109],
        ],
      },
      {
        channel: 3,
        points: [
          [20, 143],
          [20, 294],
        ],
      },
      {
        channel: 0,
        points: [
          [37, 126],
          [60, 126],
          [60, 203],
        ],
      },
      {
        channel: 1,
        points: [
          [60, 237],
          [60, 294],
        ],
      },
      {
        channel: 2,
        points: [
          [77, 220],
          [100, 220],
          [100, 294],
        ],
      },
    ],
    parts: [
      { kind: 'source', at: [20, 28] },
      { kind: 'crystal', at: [20, 76], turn: 90 },
      { kind: 'splitter', at: [20, 126] },
      { kind: 'mirror', at: [60, 126], turn: 225 },
      { kind: 'filter', at: [60, 172], turn: 90 },
      { kind: 'splitter', at: [60, 220] },
      { kind: 'mirror', at: [100, 220], turn: 225 },
      { kind: 'detector', at: [20, 310], channel: 3, turn: 90 },
      { kind: 'detector', at: [60, 310], channel: 1, turn: 90 },
      { kind: 'detector', at: [100, 310], channel: 2, turn: 90 },
      { kind: 'coincidence', at: [60, 420] },
    ],
    slots: rows([
      ['source', 25],
      ['filter', 170],
      ['herald', 240],
      ['detector-1', 290],
      ['detector-2', 340],
      ['coincidence', 400],
      ['extra', 450],
    ]),
    shutter: { at: [20, 98], turn: 90 },
  },
  dip: {
    size: [300, 516],
    wires: [
      [
        [24, 360],
        [24, 410],
        [48, 436],
      ],
      [
        [88, 360],
        [88, 410],
        [64, 436],
      ],
    ],
    lights: [
      {
        channel: 0,
        points: [
          [56, 41],
          [56, 62],
        ],
      },
      {
        channel: 0,
        points: [
          [52, 92],
          [24, 126],
          [24, 206],
          [50, 238],
        ],
      },
      {
        channel: 0,
        points: [
          [60, 92],
          [88, 126],
          [88, 206],
          [62, 238],
        ],
      },
      {
        channel: 1,
        points: [
          [50, 270],
          [24, 300],
          [24, 332],
        ],
      },
      {
        channel: 2,
        points: [
          [62, 270],
          [88, 300],
          [88, 332],
        ],
      },
    ],
    parts: [
      { kind: 'source', at: [56, 28] },
      { kind: 'crystal', at: [56, 78], turn: 90 },
      { kind: 'filter', at: [24, 166], turn: 90 },
      { kind: 'delay', at: [88, 166], turn: 90 },
      { kind: 'splitter', at: [56, 254], turn: 45 },
      { kind: 'detector', at: [24, 348], channel: 1, turn: 90 },
      { kind: 'detector', at: [88, 348], channel: 2, turn: 90 },
      { kind: 'coincidence', at: [56, 448] },
    ],
    slots: rows([
      ['source', 25],
      ['filter', 112],
      ['delay', 162],
      ['detector-1', 322],
      ['detector-2', 372],
      ['coincidence', 430],
      ['extra', 480],
    ]),
    shutter: { at: [56, 54], turn: 90 },
  },
  pol: {
    size: [300, 452],
    wires: [
      [
        [24, 296],
        [24, 346],
        [48, 372],
      ],
      [
        [88, 296],
        [88, 346],
        [64, 372],
      ],
    ],
    lights: [
      {
        channel: 0,
        points: [
          [56, 41],
          [56, 62],
        ],
      },
      {
        channel: 1,
        points: [
          [52, 92],
          [24, 126],
          [24, 268],
        ],
      },
      {
        channel: 2,
        points: [
          [60, 92],
          [88, 126],
          [88, 268],
        ],
      },
    ],
    parts: [
      { kind: 'source', at: [56, 28] },
      { kind: 'crystal', at: [56, 78], turn: 90 },
      { kind: 'filter', at: [24, 156], turn: 90 },
      { kind: 'filter', at: [88, 156], turn: 90 },
      { kind: 'analyser', at: [24, 214], analyser: 0 },
      { kind: 'analyser', at: [88, 214], analyser: 1 },
      { kind: 'detector', at: [24, 284], channel: 1, turn: 90 },
      { kind: 'detector', at: [88, 284], channel: 2, turn: 90 },
      { kind: 'coincidence', at: [56, 384] },
    ],
    slots: rows([
      ['source', 25],
      ['filter', 140],
      ['analysers', 204],
      ['detector-1', 262],
      ['detector-2', 312],
      ['coincidence', 366],
      ['extra', 416],
    ]),
    shutter: { at: [56, 54], turn: 90 },
  },
}
