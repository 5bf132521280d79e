import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest'
import { emptyDocument } from '../../server/document/index.ts'
import { ContentSaver, type SaverPorts } from '../../src/features/entries/content-saver.ts'
import { ApiProblem, unreachable } from '../../src/lib/api-problem.ts'

const stale = new ApiProblem({
  code: 'stale-content',
  status: 412,
  title: 'Someone else saved first',
  detail: 'x',
})
const sealed = new ApiProblem({
  code: 'wrong-state',
  status: 409,
  title: 'Not possible',
  detail: 'The entry is sealed.',
})

/** A server that keeps one text under If-Match, as HTTP says (RFC 9110, 13.1.1). */
function server() {
  let save = 0
  const ports = {
    put: vi.fn<SaverPorts['put']>(async (_, ifMatch) => {
      if (ifMatch !== `"${save}"`) throw stale
      save += 1
      return { etag: `"${save}"`, savedAt: '2026-11-12T13:58:31.000Z' }
    }),
    currentEtag: vi.fn(async () => `"${save}"`),
    cutRevision: vi.fn<SaverPorts['cutRevision']>(async () => {}),
  }
  return { ports, someoneElseSaves: () => (save += 1), saver: new ContentSaver(ports, '"0"', emptyDocument) }
}

beforeEach(() => void vi.useFakeTimers())
afterEach(() => void vi.useRealTimers())

describe('autosave', () => {
  test('a keystroke is saved within two seconds', async () => {
    const { saver, ports } = server()
    saver.changed()
    expect(saver.getState().name).toBe('unsaved')
    await vi.advanceTimersByTimeAsync(2000)
    expect(ports.put).toHaveBeenCalledTimes(1)
    expect(saver.getState()).toEqual({ name: 'saved', at: '2026-11-12T13:58:31.000Z' })
    expect(saver.hasUnsaved()).toBe(false)
  })

  test('steady typing is saved every two seconds, each save naming the one before', async () => {
    const { saver, ports } = server()
    for (let key = 0; key < 100; key++) {
      saver.changed()
      await vi.advanceTimersByTimeAsync(100)
    }
    expect(ports.put.mock.calls.length).toBeGreaterThanOrEqual(5)
    expect(ports.put.mock.calls.map(([, ifMatch]) => ifMatch)).toEqual(
      ports.put.mock.calls.map((_, at) => `"${at}"`),
    )
  })

  test('what is typed while a save is on its way is saved after it', async () => {
    const { saver, ports } = server()
    let answer = () => {}
    ports.put.mockImplementationOnce(
      () =>
        new Promise(
          (resolve) => (answer = () => resolve({ etag: '"0"', savedAt: '2026-11-12T13:58:31.000Z' })),
        ),
    )
    saver.changed()
    await vi.advanceTimersByTimeAsync(1500)
    saver.changed()
    answer()
    await vi.advanceTimersByTimeAsync(0)
    expect(saver.getState().name).toBe('unsaved')
    await vi.advanceTimersByTimeAsync(1500)
    expect(ports.put).toHaveBeenCalledTimes(2)
    expect(saver.getState().name).toBe('saved')
  })
})

describe('no answer', () => {
  test('it goes on trying, further and further apart, and saves when the server is back', async () => {
    const { saver, ports } = server()
    ports.put.mockRejectedValueOnce(unreachable()).mockRejectedValueOnce(unreachable())
    saver.changed()
    await vi.advanceTimersByTimeAsync(1500)
    expect(saver.getState()).toMatchObject({ name: 'offline', attempts: 1 })
    await vi.advanceTimersByTimeAsync(1000)
    expect(saver.getState()).toMatchObject({ name: 'offline', attempts: 2 })
    expect(saver.hasUnsaved()).toBe(true)
    await vi.advanceTimersByTimeAsync(2000)
    expect(saver.getState().name).toBe('saved')
  })
})

describe('somebody else saved first', () => {
  async function conflict() {
    const all = server()
    all.someoneElseSaves()
    all.saver.changed()
    await vi.advanceTimersByTimeAsync(1500)
    return all
  }

  test('nothing more is sent until the person chooses', async () => {
    const { saver, ports } = await conflict()
    expect(saver.getState().name).toBe('conflict')
    saver.changed()
    saver.pageHides()
    await saver.flush()
    await vi.advanceTimersByTimeAsync(60_000)
    expect(ports.put).toHaveBeenCalledTimes(1)
    expect(saver.hasUnsaved()).toBe(true)
  })

  test('mine goes on top only by choice, after theirs was made a revision', async () => {
    const { saver, ports } = await conflict()
    await saver.saveMineOnTop()
    expect(ports.cutRevision.mock.invocationCallOrder[0]).toBeLessThan(ports.put.mock.invocationCallOrder[1]!)
    expect(ports.put.mock.calls[1]?.[1]).toBe('"1"')
    expect(saver.getState().name).toBe('saved')
  })

  test('a third who saves in between is not overwritten either', async () => {
    const { saver, ports, someoneElseSaves } = await conflict()
    ports.currentEtag.mockImplementationOnce(async () => {
      someoneElseSaves()
      return '"1"'
    })
    await saver.saveMineOnTop()
    expect(saver.getState().name).toBe('conflict')
  })

  test('taking theirs leaves nothing unsaved', async () => {
    const { saver } = await conflict()
    saver.adopt('"1"')
    expect(saver.getState().name).toBe('saved')
    expect(saver.hasUnsaved()).toBe(false)
  })
})

describe('refusal and leaving', () => {
  test('a sealed entry says why, and the text is still there', async () => {
    const { saver, ports } = server()
    ports.put.mockRejectedValueOnce(sealed)
    saver.changed()
    await vi.advanceTimersByTimeAsync(1500)
    expect(saver.getState()).toEqual({ name: 'refused', problem: sealed })
    expect(saver.hasUnsaved()).toBe(true)
    await vi.advanceTimersByTimeAsync(60_000)
    expect(ports.put).toHaveBeenCalledTimes(1)
  })

  test('leaving saves first and then cuts a revision, once', async () => {
    const { saver, ports } = server()
    saver.changed()
    await saver.leave()
    expect(ports.put).toHaveBeenCalledTimes(1)
    expect(ports.cutRevision.mock.calls).toEqual([['leaving', false]])
    await saver.leave()
    expect(ports.cutRevision).toHaveBeenCalledTimes(1)
  })

  test('a page that goes away sends what is unsaved in a request that outlives it', () => {
    const { saver, ports } = server()
    saver.changed()
    saver.pageHides()
    expect(ports.put.mock.calls[0]?.[2]).toBe(true)
  })

  test('nothing written, nothing sent', async () => {
    const { saver, ports } = server()
    saver.pageHides()
    await saver.leave()
    expect(ports.put).not.toHaveBeenCalled()
    expect(ports.cutRevision).not.toHaveBeenCalled()
  })
})
