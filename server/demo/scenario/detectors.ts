import { darkRecord, heraldedRecord } from '../simulator/records.ts'
import { calculation, doc, p, quote } from '../text.ts'
import type { Act } from './act.ts'

/** Third notebook: the laboratory's detectors. */
export function detectorSheets(): Act[] {
  let notebook = ''

  return [
    {
      daysAgo: 27,
      at: '7:45',
      async play({ bench, maren, teo, farid, noor }) {
        notebook = await bench.notebook(maren, 'Detectors and calibration', [
          [teo, 'experimentalist'],
          [farid, 'supervisor'],
          [noor, 'auditor'],
        ])
      },
    },
    {
      daysAgo: 26,
      at: '9:15',
      async play({ bench, maren, farid, apparatus }) {
        const entry = await bench.entry(maren, notebook, 'Dark rates of D1 Heron and D2 Plover', 'calibration')
        const run = await bench.run(maren, entry, {
          experiment: 'calibration',
          seconds: 90,
          conditions: [['detector temperature', '2.4', '0.05', 'K']],
          apparatus: [
            { id: apparatus.heron, role: 'A', channel: 1 },
            { id: apparatus.plover, role: 'B', channel: 2 },
          ],
        })
        const file = await bench.upload(maren, run, 'dark-90s.csv', darkRecord(301, 90))
        const singles = await bench.compute(maren, entry, 'singles', file, {})
        await bench.write(
          maren,
          entry,
          doc(
            p('Fibres capped, room light off. Bias supplies on for an hour before; stored charge: supplies were switched off and discharged before the caps were changed.'),
            calculation(singles),
            p('D1: ', quote(singles, '/channels/0/rate'), '. D2: ', quote(singles, '/channels/1/rate'), '. The counts are Poissonian by the index of dispersion.'),
          ),
        )
        await bench.sign(maren, entry, 'authorship')
        bench.pass(3 * 60)
        await bench.seal(farid, entry)
      },
    },
    {
      daysAgo: 2,
      at: '13:05',
      async play({ bench, maren, apparatus }) {
        const entry = await bench.entry(maren, notebook, 'Timing response of D3 against D1', 'calibration')
        const run = await bench.run(maren, entry, {
          experiment: 'calibration',
          seconds: null,
          conditions: [['detector temperature', '2.4', '0.05', 'K']],
          apparatus: [
            { id: apparatus.crystal, role: 'source', channel: null },
            { id: apparatus.lapwing, role: 'A', channel: 0 },
            { id: apparatus.heron, role: 'B', channel: 1 },
          ],
        })
        const file = await bench.upload(maren, run, 'pair-timing.csv', heraldedRecord(302, { pairsCps: 90_000, heraldEfficiency: 0.3, signalEfficiency: 0.3 }, 0.7))
        const peak = await bench.compute(maren, entry, 'correlation', file, { a: 0, b: 1, binPs: 100, halfRangePs: 5000, offsetPs: 4800 })
        await bench.write(
          maren,
          entry,
          doc(
            p('Photons of one pair are born together, so the width of their coincidence peak is the timing response of the two detectors with the electronics.'),
            calculation(peak),
            p('The peak stands at zero after the cable offset of 4.8 ns.'),
          ),
        )
        await bench.sign(maren, entry, 'authorship')
      },
    },
    {
      daysAgo: 0,
      at: '0:20',
      async play({ bench, maren }) {
        await bench.entry(maren, notebook, 'Dead time of D2, method of two sources', 'calibration')
      },
    },
  ]
}
