import { heraldedRecord } from '../simulator/records.ts'
import { calculation, doc, m, maths, p, quote } from '../text.ts'
import { LASER_CAUTION, type Act, type Scene } from './act.ts'

function pairSetup(apparatus: Scene['apparatus']) {
  return [
    { id: apparatus.crystal, role: 'source', channel: null },
    { id: apparatus.lapwing, role: 'herald', channel: 0 },
    { id: apparatus.heron, role: 'A', channel: 1 },
    { id: apparatus.plover, role: 'B', channel: 2 },
  ]
}

const PAIRS = { windowPs: 2001, delayPs: 4800, offPeakWindows: 8, offPeakStepPs: 100_000 }

/** Second notebook: photon pairs from a crystal, with an addendum and a sheet that waits for its second author. */
export function heraldedPairs(): Act[] {
  let notebook = ''
  let efficiency = ''

  return [
    {
      daysAgo: 30,
      at: '8:00',
      async play({ bench, maren, teo, farid, noor }) {
        notebook = await bench.notebook(teo, 'Heralded pairs, crystal PP-04', [
          [maren, 'experimentalist'],
          [farid, 'supervisor'],
          [noor, 'auditor'],
        ])
      },
    },
    {
      daysAgo: 29,
      at: '10:00',
      async play({ bench, teo, farid, apparatus }) {
        efficiency = await bench.entry(teo, notebook, 'Heralding with crystal PP-04', 'heralded')
        const run = await bench.run(teo, efficiency, {
          experiment: 'heralded',
          seconds: null,
          conditions: [
            ['crystal temperature', '41.2', '0.2', '°C'],
            ['pump power', '3.1', '0.1', 'mW'],
          ],
          apparatus: pairSetup(apparatus),
        })
        const file = await bench.upload(teo, run, 'pairs-pp04.csv', heraldedRecord(1801, { pairsCps: 60_000, heraldEfficiency: 0.3, signalEfficiency: 0.25 }, 1.6))
        const a = await bench.compute(teo, efficiency, 'coincidences', file, { a: 0, b: 1, ...PAIRS })
        const b = await bench.compute(teo, efficiency, 'coincidences', file, { a: 0, b: 2, ...PAIRS })
        await bench.write(
          teo,
          efficiency,
          doc(
            p('Pairs from the crystal: the idler heralds on D3, the signal goes through the splitter to D1 and D2. Coincidences of the herald with each arm, window 2 ns at the delay of the fibre.'),
            p(LASER_CAUTION),
            calculation(a),
            calculation(b),
            p('Coincidences stand above the accidentals by a factor of ', quote(a, '/car'), ' on D1. The heralding efficiency of arm 1, from the herald rate,'),
            maths('\\eta = \\frac{W_2 - W_{\\mathrm{acc}}}{W_1^{\\mathrm{herald}} - D}'),
            p('is ', quote(a, '/klyshko/b'), ' and of arm 2 ', quote(b, '/klyshko/b'), '.'),
          ),
        )
        await bench.sign(teo, efficiency, 'authorship')
        bench.pass(50 * 60)
        await bench.seal(farid, efficiency)
      },
    },
    {
      daysAgo: 21,
      at: '11:30',
      async play({ bench, teo, farid }) {
        const addendum = await bench.addendum(teo, efficiency, 'Addendum: dark rate of the herald')
        await bench.write(teo, addendum, doc(p('The dark rate of D3 was not subtracted in the sheet amended. It was 110 ± 5 cps that day, below 1 % of the herald rate; the efficiencies rise by less than their uncertainty.')))
        await bench.sign(teo, addendum, 'authorship')
        bench.pass(18 * 60)
        await bench.seal(farid, addendum)
      },
    },
    {
      daysAgo: 3,
      at: '15:10',
      async play({ bench, maren, teo, apparatus }) {
        const entry = await bench.entry(teo, notebook, 'Pair rate against pump power', 'heralded')
        const run = await bench.run(teo, entry, {
          experiment: 'heralded',
          seconds: null,
          conditions: [['pump power', '6.2', '0.1', 'mW']],
          apparatus: pairSetup(apparatus),
        })
        const file = await bench.upload(teo, run, 'pairs-6mW.csv', heraldedRecord(1803, { pairsCps: 120_000, heraldEfficiency: 0.3, signalEfficiency: 0.25 }, 0.8))
        const pairs = await bench.compute(teo, entry, 'coincidences', file, { a: 0, b: 1, ...PAIRS })
        const begun = [
          p('Twice the pump power of the first sheet. The pair rate should double, the ratio to accidentals should halve.'),
          calculation(pairs),
        ]
        await bench.write(teo, entry, doc(...begun))
        bench.pass(30)
        await bench.write(maren, entry, doc(...begun, p('Read together: the ratio is ', quote(pairs, '/car'), ', half of the first within its uncertainty, so the accidentals are those of uncorrelated pairs, ', m('W_{\\mathrm{acc}} \\propto P^2'), '.')))
        await bench.sign(teo, entry, 'authorship')
      },
    },
  ]
}
