import { continuousRecord, darkRecord, lampRecord, pulsedRecord } from '../simulator/records.ts'
import { bullets, calculation, doc, h, m, maths, p, quote, table } from '../text.ts'
import { LASER_CAUTION, splitterSetup, type Act } from './act.ts'

/** First notebook: single quantum dots in a nanobeam, from the first lamp check to a sheet that is being written. */
export function nanobeamDots(): Act[] {
  let notebook = ''
  let splitterSheet = ''
  let darkSheet = ''

  return [
    {
      daysAgo: 43,
      at: '8:30',
      async play({ bench, maren, teo, farid, noor }) {
        notebook = await bench.notebook(maren, 'Nanobeam dots', [
          [teo, 'experimentalist'],
          [farid, 'supervisor'],
          [noor, 'auditor'],
        ])
      },
    },
    {
      daysAgo: 42,
      at: '9:05',
      async play({ bench, maren, farid, apparatus }) {
        const entry = await bench.entry(maren, notebook, 'Lamp check, 546 nm line', 'chaotic')
        const run = await bench.run(maren, entry, {
          experiment: 'chaotic',
          seconds: null,
          conditions: [
            ['lamp current', '0.42', '0.01', 'A'],
            ['room temperature', '21.3', '0.2', '°C'],
          ],
          apparatus: splitterSetup(apparatus, 'lamp'),
        })
        const file = await bench.upload(maren, run, 'lamp-546.csv', lampRecord(4601, { coherencePs: 1.2e6, meanCps: 3e5 }, 0.3))
        const g2 = await bench.compute(maren, entry, 'correlation', file, {
          a: 1,
          b: 2,
          binPs: 100_000,
          halfRangePs: 8_000_000,
          fit: { model: 'chaotic-lorentzian' },
        })
        await bench.write(
          maren,
          entry,
          doc(
            p('A known bunched source before the dots: light of one line of the lamp behind the single-mode fibre. Both detectors must show the peak of chaotic light, or the set-up is at fault.'),
            calculation(g2),
            p('The contrast is ', quote(g2, '/fit/parameters/beta'), ' and the coherence time ', quote(g2, '/fit/parameters/tc'), ', as expected for one polarisation through one spatial mode.'),
          ),
        )
        await bench.sign(maren, entry, 'authorship')
        bench.pass(26 * 60)
        await bench.seal(farid, entry)
      },
    },
    {
      daysAgo: 36,
      at: '13:20',
      async play({ bench, teo, farid }) {
        const entry = await bench.entry(teo, notebook, 'Fibre coupling into D2', 'calibration')
        await bench.write(
          teo,
          entry,
          doc(
            p('The second arm was re-aligned after the mirror mount was exchanged. Power in front of and behind the fibre, at 915 nm:'),
            table(['Arm', 'before / µW', 'behind / µW', 'coupling'], ['D1', '1.00', '0.71', '0.71'], ['D2', '1.00', '0.68', '0.68']),
            p('Both arms stay within 5 % over an hour. The splitter ratio is to be measured with the dots themselves.'),
          ),
        )
        await bench.sign(teo, entry, 'authorship')
        bench.pass(20 * 60)
        await bench.seal(farid, entry)
      },
    },
    {
      daysAgo: 16,
      at: '10:10',
      async play({ bench, maren, apparatus }) {
        splitterSheet = await bench.entry(maren, notebook, 'Splitter ratio at 915 nm', 'hbt')
        const run = await bench.run(maren, splitterSheet, {
          experiment: 'hbt',
          seconds: null,
          conditions: [
            ['temperature', '4.2', '0.1', 'K'],
            ['drive power', '0.60', '0.02', 'µW'],
          ],
          apparatus: splitterSetup(apparatus, 'dot31b'),
        })
        const file = await bench.upload(maren, run, 'splitter-915.csv', continuousRecord(3812, { drivePs: 14_000, lifetimePs: 3600, efficiency: 1.1e-3, leakCps: 2_000 }, 0.9))
        const singles = await bench.compute(maren, splitterSheet, 'singles', file, {})
        await bench.write(
          maren,
          splitterSheet,
          doc(
            p('Ratio of the two arms on the dot’s own line. Singles on D1 and D2 with the filter in place:'),
            calculation(singles),
            p('D1 counts ', quote(singles, '/channels/0/rate'), ', D2 ', quote(singles, '/channels/1/rate'), '.'),
          ),
        )
        await bench.sign(maren, splitterSheet, 'authorship')
      },
    },
    {
      daysAgo: 11,
      at: '14:40',
      async play({ bench, maren, apparatus }) {
        darkSheet = await bench.entry(maren, notebook, 'Dark counts after cooldown 6', 'calibration')
        const run = await bench.run(maren, darkSheet, {
          experiment: 'calibration',
          seconds: 60,
          conditions: [['temperature', '4.2', '0.1', 'K']],
          apparatus: [
            { id: apparatus.heron, role: 'A', channel: 1 },
            { id: apparatus.plover, role: 'B', channel: 2 },
          ],
        })
        const file = await bench.upload(maren, run, 'dark-cooldown-6.csv', darkRecord(3907, 60))
        const singles = await bench.compute(maren, darkSheet, 'singles', file, {})
        await bench.write(
          maren,
          darkSheet,
          doc(
            p('Shutter closed, room light off, one minute.'),
            calculation(singles),
            p('D2 reads ', quote(singles, '/channels/1/rate'), ', a little more than before the cooldown.'),
          ),
        )
        await bench.sign(maren, darkSheet, 'authorship')
      },
    },
    {
      daysAgo: 10,
      at: '8:50',
      async play({ bench, farid }) {
        await bench.giveBack(farid, darkSheet, 'Which dark rate did you subtract for D2 in the sheets before? Say it here, and whether the shutter was checked.')
      },
    },
    {
      daysAgo: 8,
      at: '12:00',
      async play({ bench, teo }) {
        const entry = await bench.entry(teo, notebook, 'Filter scan at 915 nm', 'other')
        await bench.write(teo, entry, doc(p('Scan of the band-pass filter over the line, 0.1 nm steps.'), p('Stopped after the third step: the motor lost its reference.')))
        await bench.withdraw(teo, entry, 'The scan was not completed; it is repeated in another sheet.')
      },
    },
    {
      daysAgo: 4,
      at: '9:25',
      async play({ bench, teo, apparatus }) {
        const entry = await bench.entry(teo, notebook, 'Pulsed purity, dot 27a', 'hbt-pulsed')
        const run = await bench.run(teo, entry, {
          experiment: 'hbt-pulsed',
          seconds: null,
          conditions: [
            ['temperature', '4.2', '0.1', 'K'],
            ['repetition rate', '80.0', null, 'MHz'],
          ],
          apparatus: splitterSetup(apparatus, 'dot27a'),
        })
        const file = await bench.upload(teo, run, 'dot-27a-pulsed.csv', pulsedRecord(4107, { lifetimePs: 900, efficiency: 4e-3, secondChance: 0.03 }, 1.2))
        const comb = await bench.compute(teo, entry, 'correlation', file, { a: 1, b: 2, binPs: 500, halfRangePs: 60_000 })
        const missing = await bench.compute(teo, entry, 'coincidences', file, { a: 1, b: 4, windowPs: 3000, delayPs: 0, offPeakWindows: 4, offPeakStepPs: 12_500 })
        await bench.write(
          teo,
          entry,
          doc(
            p('Dot 27a under 80 MHz excitation. The side peaks stand 12.5 ns apart; the one at zero delay is missing but for a remainder.'),
            calculation(comb),
            p('Coincidences against the reference channel, to be repeated once it is connected:'),
            calculation(missing),
          ),
        )
      },
    },
    {
      daysAgo: 0,
      at: '0:35',
      async play({ bench, maren, teo, apparatus }) {
        const entry = await bench.entry(maren, notebook, 'Purity of dot 31b under continuous drive', 'hbt')
        const run = await bench.run(maren, entry, {
          experiment: 'hbt',
          seconds: null,
          conditions: [
            ['temperature', '4.2', '0.1', 'K'],
            ['drive wavelength', '785', null, 'nm'],
            ['drive power', '0.80', '0.02', 'µW'],
            ['line', '915.3', '0.1', 'nm'],
            ['filter width', '0.3', null, 'nm'],
          ],
          apparatus: [...splitterSetup(apparatus, 'dot31b'), { id: apparatus.filter, role: 'filter', channel: null }],
        })
        const file = await bench.upload(maren, run, 'dot-31b-cw.csv', continuousRecord(4231, { drivePs: 11_000, lifetimePs: 3600, efficiency: 8.4e-3, leakCps: 24_000 }, 1.2))
        const singles = await bench.compute(maren, entry, 'singles', file, {})
        const pairs = await bench.compute(maren, entry, 'coincidences', file, {
          a: 1,
          b: 2,
          windowPs: 2001,
          delayPs: 0,
          offPeakWindows: 10,
          offPeakStepPs: 100_000,
        })
        const g2 = await bench.compute(maren, entry, 'correlation', file, {
          a: 1,
          b: 2,
          binPs: 500,
          halfRangePs: 30_000,
          fit: { model: 'two-level', responseFwhmPs: 520 },
        })
        await bench.write(
          maren,
          entry,
          doc(
            p('Dot 31b sits in the widened section of the nanobeam and was the brightest emitter of Tuesday’s map. We drove it continuously at 785 nm, well below saturation, and asked whether the line at 915.3 nm comes from one emitter. The test is the usual one: split the light, start on D1, stop on D2, and look for ', m('g^{(2)}(0) < \\tfrac{1}{2}'), ' after correcting for accidentals.'),
            p('Counts per bin were normalised to the accidental rate ', m("W_1 W_1'\\,\\Delta t"), ' of the same run, so no assumption about the far level enters the plot. The model is a single emitter with lifetime ', m('t_1'), ' folded with the timing response of the pair,'),
            maths('g^{(2)}(\\tau) = 1 - (1 - g_0)\\,e^{-|\\tau|/t_1} \\;\\ast\\; \\mathcal{N}(0, \\sigma)'),
            h(2, 'Rates'),
            table(['Drive / µW', 'D1 / kcps', 'D2 / kcps', 'Remark'], ['0.20', '83', '80', 'stable'], ['0.80', '304', '295', 'chosen'], ['2.40', '518', '502', 'broadened']),
            p(LASER_CAUTION),
            calculation(singles),
            calculation(pairs),
            h(2, 'Correlation'),
            calculation(g2),
            p('The fit gives ', m('g^{(2)}(0) ='), ' ', quote(g2, '/fit/g2Zero'), ' with a recovery time of ', quote(g2, '/fit/parameters/t1'), '; the bin at zero delay alone reads ', quote(g2, '/g2Zero'), '. The light comes from one emitter.'),
          ),
        )
        await bench.write(
          teo,
          await bench.entry(teo, notebook, 'Plan: saturation of dot 31b', 'hbt'),
          doc(
            p('To be done next, with the set-up of the sheet before:'),
            bullets('five drive powers from 0.1 to 5 µW, five minutes each', 'record W1 on both arms and the correlation', 'fit the saturation power'),
          ),
        )
      },
    },
  ]
}
