import { useState, type ReactNode } from 'react'
import { createRoot } from 'react-dom/client'
import { MemoryRouter } from 'react-router-dom'
import { BeamPath, ClosedSetUp, MiniBeam, type BeamNode } from '../../src/plots/beam-path/beam-path.tsx'
import type { BeamVariant, NodeId } from '../../src/plots/beam-path/variants.ts'
import { ChannelKey, ChannelMarks } from '../../src/plots/channel-key.tsx'
import { FigurePlot } from '../../src/plots/figure-plot.tsx'
import { Preview } from '../../src/plots/preview.tsx'
import '../../src/styles/app.css'
import {
  Block,
  BlockLine,
  BlockParameters,
  BlockPart,
  BlockResult,
  Provenance,
  type BlockState,
} from '../../src/ui/block.tsx'
import { Button, TextButton, TextLink } from '../../src/ui/button.tsx'
import { Checkbox } from '../../src/ui/checkbox.tsx'
import { Dialog, DialogPart } from '../../src/ui/dialog.tsx'
import { Diff } from '../../src/ui/diff.tsx'
import { Digest, groupedDigest } from '../../src/ui/digest.tsx'
import { EmptyState } from '../../src/ui/empty-state.tsx'
import { PassphraseField, TextArea, TextField } from '../../src/ui/field.tsx'
import { FringeMark } from '../../src/ui/fringe-mark.tsx'
import { Crumbs, Ground, PageHead } from '../../src/ui/ground.tsx'
import { Icon, type IconName } from '../../src/ui/icon.tsx'
import { KeysHelp } from '../../src/ui/keys-help.tsx'
import { Message } from '../../src/ui/message.tsx'
import { OptionRow } from '../../src/ui/option-row.tsx'
import { ParameterChoice, ParameterField } from '../../src/ui/parameter-field.tsx'
import { Progress } from '../../src/ui/progress.tsx'
import { KeyResult, OtherResult, Quantity } from '../../src/ui/quantity.tsx'
import { Rail } from '../../src/ui/rail.tsx'
import { SealLine, type Station } from '../../src/ui/seal-line.tsx'
import { Select, SelectSlot } from '../../src/ui/select.tsx'
import {
  Columns,
  Facts,
  Section,
  Sheet,
  SheetBody,
  SheetFoot,
  SheetHead,
  SheetRow,
  SheetStrip,
} from '../../src/ui/sheet.tsx'
import { StateGlyph, type StateName } from '../../src/ui/state-glyph.tsx'
import { Symbol } from '../../src/ui/symbol.tsx'
import { Table } from '../../src/ui/table.tsx'
import { UiRoot } from '../../src/ui/ui-root.tsx'
import { WaitingScale } from '../../src/ui/waiting-scale.tsx'
import { chooseTheme, type Level, type Theme } from '../../src/ui/use-theme.ts'
import { ratesFigure, sampleFigure } from './sample-figure.ts'

// Everything in one place, to look at beside the pictures of the design. Not part of the product.

const asked = new URLSearchParams(location.search)
chooseTheme({
  theme: (asked.get('theme') ?? 'day') as Theme,
  level: Number(asked.get('level') ?? 2) as Level,
})

const seal = 'ab643d187ab82fbed558e70424c968e6df0e7a0a1513acd03d72bfb4e2db1218'
const head = '0f47f0495da90d8cd6cea4d1a36b586a3ae88d9d4fbe207a28152cdeebb6d65d'
const digests = Array.from({ length: 21 }, (_, at) =>
  Array.from({ length: 32 }, (_, each) =>
    ((at * 37 + each * 101 + at * each * 13 + 11) % 256).toString(16).padStart(2, '0'),
  ).join(''),
)

const items: { label: string; icon: IconName; count?: number; onPhone?: boolean }[] = [
  { label: 'Bench', icon: 'bench' },
  { label: 'Notebooks', icon: 'notebook' },
  { label: 'Runs', icon: 'trace', onPhone: false },
  { label: 'Witness desk', icon: 'eye', count: 3 },
  { label: 'Ledger', icon: 'chain' },
  { label: 'Apparatus', icon: 'gear', onPhone: false },
  { label: 'People', icon: 'people', onPhone: true },
]

const detectors = {
  'detector-1': { label: 'D1 Heron, W', sub: '1', figure: '41 283', more: '± 8 cps' },
  'detector-2': { label: 'D2 Plover, W', sub: '1', figure: '38 917', more: '± 8 cps' },
}
const nodes: Record<BeamVariant, Partial<Record<NodeId, BeamNode>>> = {
  hbt: {
    source: { label: 'Source RPL-QD-31b', figure: '915.3 nm', more: 'cw' },
    filter: { label: 'Filter, ND', figure: '0.3 nm', more: 'OD 1.5' },
    splitter: { label: 'Splitter', figure: '49.2 : 50.8' },
    ...detectors,
    coincidence: {
      label: 'Coincidence W',
      sub: '2',
      labelEnd: ', window 2.0 ns',
      figure: '0.64',
      more: '± 0.03 cps',
    },
    extra: { label: 'Accidentals', figure: '3.213', more: '± 0.001 cps' },
  },
  her: {
    source: { label: 'Pump', figure: '404.6 nm', more: '12 mW' },
    herald: { label: 'Herald H Snipe', figure: '218 400', more: '± 19 cps' },
    ...detectors,
    coincidence: { label: 'Threefold, window 1.5 ns', figure: '0.021', more: '± 0.006 cps' },
    extra: { label: 'Heralding efficiency', figure: '0.106', more: '± 0.001' },
  },
  dip: {
    source: { label: 'Pair source', figure: '810 nm', more: 'crystal' },
    delay: { label: 'Delay stage', figure: '−12.40', more: 'µm' },
    ...detectors,
    coincidence: { label: 'Coincidence, window 2.0 ns', figure: '212', more: '± 2 cps' },
    extra: { label: 'Dip visibility', figure: '0.941', more: '± 0.008' },
  },
  pol: {
    source: { label: 'Pair source', figure: '810 nm', more: 'ring' },
    analysers: { label: 'Analysers', figure: '0°, 22.5°' },
    ...detectors,
    'detector-2': {
      label: 'D2 Plover',
      figure: '47 660',
      more: '± 9 cps',
      fault: 'Counts above the safe rate.',
    },
    coincidence: { label: 'Coincidence, window 2.0 ns', figure: '1874', more: '± 6 cps' },
    extra: { label: 'Correlation S', figure: '2.61', more: '± 0.03' },
  },
}

function stations(done: number): Station[] {
  const all: (Station & { todo: string })[] = [
    {
      name: 'Signed by author',
      drawing: 'signature',
      state: 'done',
      todo: 'signs text, files and calculations',
      lines: [
        'Maren Adeyemi',
        '12 Nov 2026, 16:20',
        <span key="k" className="hs-fig hs-small">
          key 7c1e 90b4
        </span>,
      ],
    },
    {
      name: 'Submitted',
      drawing: 'arrow',
      state: 'done',
      todo: 'a witness who is not an author',
      lines: ['to Dr Farid Shirvani', '12 Nov 2026, 16:21'],
    },
    {
      name: 'Countersigned',
      drawing: 'half',
      state: 'done',
      todo: 'by the witness',
      lines: ['Dr Farid Shirvani', '13 Nov 2026, 09:12'],
    },
    {
      name: 'Sealed in the ledger',
      drawing: 'full',
      state: 'done',
      todo: 'nothing can change afterwards',
      lines: ['event 4812', '13 Nov 2026, 09:12'],
      sha256: seal,
    },
  ]
  return all.map((station, at) =>
    at < done
      ? station
      : { ...station, state: 'todo', lines: [station.todo], sha256: undefined, current: at === done },
  )
}

function CalcBlock({
  state,
  children,
  figure,
}: {
  state: BlockState
  children?: ReactNode
  figure?: ReactNode
}) {
  const [bin, setBin] = useState('0.50')
  const [model, setModel] = useState<'one' | 'two'>('one')
  return (
    <Block
      state={state}
      number="C2"
      title="Second-order correlation with fit"
      share={0.64}
      label="Calculation C2"
    >
      <BlockLine>
        <span>
          <Icon name="trace" /> R-0612.csv
        </span>
        <ChannelKey channel={1}>D1</ChannelKey>
        <ChannelKey channel={2}>D2</ChannelKey>
      </BlockLine>
      {state === 'sealed' ? (
        <BlockLine>
          <span className="hs-fig">0.50 ns, ±20 ns, one emitter</span>
        </BlockLine>
      ) : (
        <BlockParameters>
          <ParameterField
            label="Bin"
            unit="ns"
            value={bin}
            onCommit={setBin}
            check={(text) => (Number(text) > 0 ? null : 'A bin must be above 0 ns.')}
            disabled={state === 'running'}
          />
          <ParameterField
            label="Range"
            unit="ns"
            value="±20"
            onCommit={() => {}}
            disabled={state === 'running'}
          />
          <ParameterChoice
            label="Model"
            value={model}
            onCommit={setModel}
            choices={[
              { value: 'one', label: 'one emitter' },
              { value: 'two', label: 'two emitters' },
            ]}
          />
        </BlockParameters>
      )}
      {figure && <BlockPart>{figure}</BlockPart>}
      {children}
    </Block>
  )
}

function Blocks() {
  const result = (
    <BlockResult>
      <KeyResult symbol="g^(2)(0)" value="0.083" u="0.011" />
    </BlockResult>
  )
  const old = (
    <BlockResult>
      <KeyResult symbol="g^(2)(0)" value="0.083" u="0.011" stale />
    </BlockResult>
  )
  return (
    <div
      style={{
        display: 'grid',
        gap: 24,
        gridTemplateColumns: 'repeat(auto-fit, minmax(min(340px, 100%), 1fr))',
        alignItems: 'start',
      }}
    >
      <CalcBlock state="queued">
        <Message>Waits for one calculation, about 50 s. You can leave this sheet.</Message>
        <Provenance actions={<TextButton>Withdraw</TextButton>}>
          <span>queued 14:51:58</span>
        </Provenance>
      </CalcBlock>
      <CalcBlock state="running">
        <BlockPart>
          <Progress label="Correlating" share={0.64} words="30.8 of 48.1 million stamps, about 40 s left" />
        </BlockPart>
        <Provenance actions={<TextButton>Stop</TextButton>}>
          <span>engine 1.0.0</span>
        </Provenance>
      </CalcBlock>
      <CalcBlock state="done">
        {result}
        <Provenance actions={<TextButton>Recompute</TextButton>}>
          <span>correlation 1.0.0</span>
          <Digest sha256={head} />
          <span>14:52:07</span>
        </Provenance>
      </CalcBlock>
      <CalcBlock state="stale">
        <Message kind="warn">
          R-0609 was replaced by R-0611 at 10:36. The figure below is from the old file.
        </Message>
        {old}
        <Provenance actions={<TextButton>Recompute</TextButton>}>
          <span>from 11 Nov, 17:02</span>
        </Provenance>
      </CalcBlock>
      <CalcBlock state="failed">
        <Message kind="fault" title="The file ends in the middle of a time stamp." code="HS-422-truncated">
          The first 47.9 million are readable.
        </Message>
        <Provenance actions={<TextButton>Use the readable part</TextButton>}>
          <span>stopped after 2.2 s</span>
        </Provenance>
      </CalcBlock>
      <CalcBlock state="sealed">
        {result}
        <Provenance actions={<TextButton>Check again</TextButton>}>
          <span>correlation 1.0.0</span>
          <Digest sha256={head} />
          <span>event 4812</span>
        </Provenance>
      </CalcBlock>
    </div>
  )
}

function SampleSheet() {
  return (
    <Sheet>
      <SheetHead
        title="Purity of dot 31b under continuous drive"
        meta={[
          <>
            Sheet <span className="hs-fig">N-07/042</span>
          </>,
          'Maren Adeyemi, with Teo Laukkanen',
          'begun 12 November 2026, 10:56',
        ]}
        facts={
          <Facts
            facts={[
              { name: 'Sample', value: 'RPL-QD-31b' },
              { name: 'Witness', value: 'Dr Farid Shirvani', words: true },
            ]}
          />
        }
      />
      <SheetStrip
        head={
          <>
            <b>Beam path</b>
            <span>HBT on run R-0612, frozen at 11:30</span>
          </>
        }
      >
        <BeamPath
          variant="hbt"
          nodes={nodes.hbt}
          state="frozen"
          label="Beam path of R-0612"
          onNode={() => {}}
        />
      </SheetStrip>
      <SheetBody>
        <SheetRow
          margin={
            <>
              <Facts
                facts={[
                  { name: 'Temperature', value: '4.2 K' },
                  { name: 'Drive', value: '785 nm, 0.80 µW' },
                ]}
              />
              <p className="hs-note">
                <b>Teo, 11:48</b> Spread of 350 ps is from the August record.
              </p>
            </>
          }
        >
          <p className="hs-prose">
            Dot 31b sits in the widened section of the nanobeam and was the brightest emitter of Tuesday’s
            map. We drove it continuously at 785 nm and look for <Symbol>g^(2)(0)</Symbol> below one half,
            with lifetime <Symbol>τ_1</Symbol>.
          </p>
        </SheetRow>
        <SheetRow
          margin={
            <a className="hs-chip" href="#x">
              <Icon name="trace" size={20} />
              <span>
                <span className="hs-chip-name">R-0612.csv</span>
                <span className="hs-chip-note">48.1 M time stamps, 385 MB</span>
              </span>
              <FringeMark sha256={digests[3]!} />
            </a>
          }
        >
          <CalcBlock state="done" figure={<FigurePlot figure={ratesFigure()} height={94} />} />
        </SheetRow>
        <SheetRow>
          <CalcBlock state="done" figure={<FigurePlot figure={sampleFigure()} />}>
            <BlockResult>
              <KeyResult symbol="g^(2)(0)" value="0.083" u="0.011" />
              <OtherResult
                name={
                  <>
                    lifetime <Symbol>τ_1</Symbol> =
                  </>
                }
                value="3.45"
                u="0.13"
                unit="ns"
              />
            </BlockResult>
            <Provenance actions={<TextButton>Recompute</TextButton>}>
              <span>correlation 1.0.0</span>
              <span>
                input <Digest sha256={head} />
              </span>
            </Provenance>
          </CalcBlock>
        </SheetRow>
      </SheetBody>
      <SheetFoot>
        <SealLine label="Seal line" stations={stations(1)} />
      </SheetFoot>
    </Sheet>
  )
}

const runs = [
  { run: 'R-0612', sample: 'RPL-QD-31b', key: '0.083', u: '0.011' },
  { run: 'R-0608', sample: 'RPL-PP-04', key: '0.941', u: '0.008' },
]

function Fields() {
  const [filter, setFilter] = useState<'all' | 'seals' | 'keys'>('all')
  const [notebook, setNotebook] = useState<'any' | 'N-07' | 'N-09'>('any')
  const [checked, setChecked] = useState(true)
  return (
    <div style={{ display: 'grid', gap: 14, maxWidth: 420 }}>
      <span className="hs-filters">
        <OptionRow
          label="Kinds"
          value={filter}
          onChange={setFilter}
          options={[
            { value: 'all', label: 'All' },
            { value: 'seals', label: 'Seals', count: 4 },
            { value: 'keys', label: 'Keys' },
          ]}
        />
        <SelectSlot
          name="Notebook"
          value={notebook}
          onChange={setNotebook}
          choices={[
            { value: 'any', label: 'any' },
            { value: 'N-07', label: 'N-07' },
          ]}
        />
      </span>
      <Select
        label="Notebook"
        value={notebook}
        onChange={setNotebook}
        hint="Sheets of this notebook"
        choices={[
          { value: 'any', label: 'any' },
          { value: 'N-07', label: 'N-07 Nanobeam dots', note: '42 sheets' },
          { value: 'N-09', label: 'N-09 Heralded pairs', note: '18 sheets' },
        ]}
      />
      <TextField label="From sheet" defaultValue="001" error="There is no sheet 001 in this notebook." />
      <PassphraseField
        label="Signing passphrase of Maren Adeyemi"
        hint="It unlocks your key on this device and is not sent."
        defaultValue="halfsilveredglass"
      />
      <TextArea label="Remark" defaultValue="Which dark rate did you subtract?" />
      <Checkbox
        label="Raw runs are attached and named"
        hint="Every file the text speaks of"
        checked={checked}
        onChange={setChecked}
      />
      <Checkbox label="Raw time stamps, 214 GB" checked={!checked} onChange={(on) => setChecked(!on)} />
      <div className="hs-actions">
        <Button kind="primary" icon="pen">
          Sign and submit
        </Button>
        <Button>Compare versions</Button>
        <Button kind="danger">Revoke key</Button>
        <Button disabledReason="You are named as an author.">Countersign</Button>
        <TextLink to="/x">Text action</TextLink>
      </div>
    </div>
  )
}

function Gallery() {
  const [dialog, setDialog] = useState(asked.get('dialog') === '1')
  const [keys, setKeys] = useState(false)
  const states: StateName[] = [
    'draft',
    'signed',
    'with-witness',
    'returned',
    'sealed',
    'withdrawn',
    'queued',
    'running',
    'done',
    'stale',
    'failed',
    'ok',
    'note',
    'fault',
  ]
  return (
    <>
      <Rail
        brand="Halfsilver"
        home="/"
        items={items.map((item, at) => ({
          ...item,
          to: `/${at}`,
          current: at === 1,
          countLabel: item.count ? `${item.count} waiting` : undefined,
        }))}
        person={{
          name: 'Maren Adeyemi',
          note: 'Experimentalist',
          entries: [
            { label: 'Your keys', to: '/keys' },
            { label: 'Sign out', act: () => {} },
          ],
        }}
      />
      <Ground>
        <Crumbs
          path={[
            <TextLink key="n" to="/">
              Notebooks
            </TextLink>,
            <TextLink key="m" to="/">
              N-07 Nanobeam dots
            </TextLink>,
            <b key="s" className="hs-fig">
              042
            </b>,
          ]}
          beside={<StateGlyph state="draft" />}
          acts={
            <>
              <Button>Ask for a remark</Button>
              <Button kind="primary" icon="pen">
                Sign and submit
              </Button>
            </>
          }
        />
        <SampleSheet />
        <div style={{ height: 24 }} />
        <PageHead title="Component board" about="Every state, one place">
          <Button onClick={() => setDialog(true)}>Open dialog</Button>
          <Button onClick={() => setKeys(true)}>Keys</Button>
        </PageHead>
        <Sheet>
          <Columns
            margin={
              <>
                <Section title="Start a sheet">
                  <div className="hs-templates">
                    {(['hbt', 'her', 'dip', 'pol'] as const).map((each) => (
                      <button key={each} type="button" className="hs-template">
                        <MiniBeam variant={each} />
                        {each}
                      </button>
                    ))}
                  </div>
                </Section>
                <Section title="Since you last read it" count="5 Nov">
                  <Diff
                    label="Changes"
                    lines={[
                      {
                        sign: '¶2',
                        pieces: [
                          { kind: 'same', text: 'The ratio was taken ' },
                          { kind: 'del', text: 'with the lamp on' },
                          { kind: 'ins', text: 'with the room dark' },
                        ],
                      },
                      {
                        sign: 'C1',
                        pieces: [
                          { kind: 'same', text: 'Window ' },
                          { kind: 'del', text: '4.0 ns' },
                          { kind: 'ins', text: '2.0 ns' },
                        ],
                      },
                    ]}
                  />
                </Section>
                <Section title="Waiting">
                  <div style={{ display: 'grid', gap: 8 }}>
                    <WaitingScale waited={9.2} />
                    <WaitingScale waited={0.3} />
                    <WaitingScale waited={4} />
                  </div>
                </Section>
                <Section title="Calculations running" count={2}>
                  <Progress label="Run" share={0.64} words="about 40 s left" />
                </Section>
              </>
            }
          >
            <Section title="Calculation block, six states">
              <Blocks />
            </Section>
            <Section title="Messages">
              <div style={{ display: 'grid', gap: 8 }}>
                <Message>Nothing waits for you.</Message>
                <Message kind="good" title="Countersigned.">
                  The sheet is sealed as event 4812.
                </Message>
                <Message kind="warn">
                  Four sheets are not sealed. They are printed with “not witnessed” across the seal line.
                </Message>
                <Message
                  kind="fault"
                  title="Saving has stopped."
                  code="HS-503-store"
                  actions={<Button kind="primary">Try now</Button>}
                >
                  The notebook store has not answered for 2 minutes. Your last characters are kept on this
                  computer.
                </Message>
              </div>
            </Section>
            <Section title="States">
              <p style={{ display: 'flex', flexWrap: 'wrap', gap: '8px 22px' }}>
                {states.map((state) => (
                  <StateGlyph key={state} state={state} />
                ))}
              </p>
            </Section>
            <Section title="Recent runs" end={<TextLink to="/r">All runs</TextLink>}>
              <Table
                label="Recent runs"
                rows={runs}
                keyOf={(row) => row.run}
                selected="R-0608"
                columns={[
                  {
                    head: 'Run',
                    cell: (row) => (
                      <TextLink to="/" className="hs-fig">
                        {row.run}
                      </TextLink>
                    ),
                    heads: true,
                  },
                  { head: 'Sample', cell: (row) => row.sample },
                  { head: 'Channels', cell: () => <ChannelMarks channels={[3, 1, 2]} /> },
                  {
                    head: 'Preview',
                    cell: () => (
                      <Preview
                        x={sampleFigure().panels[0]!.series[1]!.x}
                        y={sampleFigure().panels[0]!.series[1]!.y}
                        reference={1}
                      />
                    ),
                  },
                  {
                    head: 'Key result',
                    cell: (row) => (
                      <>
                        <Symbol>g^(2)(0)</Symbol> = <Quantity value={row.key} u={row.u} />
                      </>
                    ),
                    nowrap: true,
                  },
                  { head: 'Counts', cell: () => '24 769 800', figure: true },
                ]}
              />
            </Section>
            <Section title="Buttons and fields">
              <Fields />
            </Section>
          </Columns>
        </Sheet>
        <div style={{ height: 24 }} />
        <Sheet>
          <div style={{ padding: '32px 36px 40px' }}>
            <Section title="Beam paths">
              {(['hbt', 'her', 'dip', 'pol'] as const).map((variant) => (
                <div
                  key={variant}
                  className="hs-holes"
                  style={{ backgroundColor: 'var(--hs-table)', padding: '8px 0 4px', marginBottom: 22 }}
                >
                  <BeamPath
                    variant={variant}
                    nodes={nodes[variant]}
                    label={variant}
                    angles={[0, 22.5]}
                    onNode={() => {}}
                  />
                </div>
              ))}
              <div className="hs-holes" style={{ backgroundColor: 'var(--hs-table)', padding: '8px 0 4px' }}>
                <BeamPath variant="her" nodes={{}} label="her" state="no-light" />
              </div>
            </Section>
            <Section title="Seal line, from draft to sealed">
              <div style={{ display: 'grid', gap: 26 }}>
                {[0, 1, 2, 4].map((done) => (
                  <SealLine key={done} label={`Seal line ${done}`} stations={stations(done)} />
                ))}
                <SealLine
                  label="Returned"
                  stations={[
                    stations(2)[0]!,
                    {
                      ...stations(2)[1]!,
                      state: 'returned',
                      lines: ['Returned by Dr Farid Shirvani', '2 remarks'],
                    },
                    ...stations(2).slice(2),
                  ]}
                  across="not witnessed"
                />
              </div>
            </Section>
            <Section title="Fringe marks">
              <div style={{ display: 'flex', flexWrap: 'wrap', gap: 14 }}>
                {digests.map((each) => (
                  <FringeMark key={each} sha256={each} size={52} />
                ))}
              </div>
              <p style={{ display: 'flex', flexWrap: 'wrap', gap: 18, alignItems: 'center', marginTop: 14 }}>
                {([18, 26, 34, 52, 84] as const).map((size) => (
                  <FringeMark key={size} sha256={seal} size={size} />
                ))}
                <Digest sha256={seal} size={20} />
              </p>
            </Section>
          </div>
        </Sheet>
      </Ground>
      <Ground holes>
        <EmptyState
          picture={<ClosedSetUp variant="hbt" />}
          title="No sheets in this notebook yet"
          templates={(['hbt', 'her', 'dip', 'pol'] as const).map((each) => (
            <button key={each} type="button" className="hs-template">
              <MiniBeam variant={each} />
              <b>{each}</b>
              <span className="hs-quiet">Delay scan, visibility</span>
            </button>
          ))}
          actions={
            <Button kind="primary" icon="plus">
              Blank sheet
            </Button>
          }
        >
          A sheet holds one piece of work: what you set out to do, the runs, the calculations and the
          signatures.
        </EmptyState>
      </Ground>
      <Dialog
        open={dialog}
        onClose={() => setDialog(false)}
        title="Countersign N-07/042"
        about="Purity of dot 31b under continuous drive, by Maren Adeyemi"
        actions={
          <>
            <Button kind="primary">Countersign and seal</Button>
            <Button onClick={() => setDialog(false)}>Keep reading</Button>
          </>
        }
      >
        <DialogPart>
          <div style={{ display: 'flex', gap: 18, alignItems: 'center' }}>
            <span style={{ '--hs-fringe-ground': 'var(--hs-lift)' } as React.CSSProperties}>
              <FringeMark sha256={seal} size={84} />
            </span>
            <div>
              <p className="hs-quiet">You sign exactly this sheet</p>
              <p className="hs-fig hs-digest-full">{groupedDigest(seal)}</p>
            </div>
          </div>
        </DialogPart>
        <DialogPart>
          <p className="hs-prose">
            “I have read this sheet. It records the work it describes, and I took no part in writing it.”
          </p>
        </DialogPart>
        <PassphraseField
          label="Signing passphrase of Dr Farid Shirvani"
          hint="It unlocks your key on this device and is not sent."
        />
      </Dialog>
      <KeysHelp
        open={keys}
        onClose={() => setKeys(false)}
        keys={[
          { keys: ['Ctrl', 'K'], what: 'Find a sheet, run or detector' },
          { keys: ['g', 'b'], what: 'Go to the bench' },
        ]}
        single
        onSingle={() => {}}
      />
    </>
  )
}

createRoot(document.getElementById('root')!).render(
  <MemoryRouter>
    <UiRoot>
      <Gallery />
    </UiRoot>
  </MemoryRouter>,
)
