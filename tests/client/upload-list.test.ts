import { describe, expect, test, vi } from 'vitest'
import type { RawFile } from '../../server/contract/files.ts'
import { UploadList } from '../../src/features/files/upload-list.ts'
import { ApiProblem } from '../../src/lib/api-problem.ts'
import type { upload } from '../../src/lib/upload.ts'

const file = (name: string, bytes: number) => new File([new Uint8Array(bytes)], name)
const stored = { id: 'f1', name: 'a.csv' } as RawFile
const target = async () => ({ name: 'uploadToEntry' as const, id: 'e1' })

/** Uploads that end when the test says so. */
function held() {
  const calls: { options: Parameters<typeof upload>[1]; finish: () => void; fail: (error: Error) => void }[] =
    []
  const send = vi.fn<typeof upload>(
    (_, options) =>
      new Promise((resolve, reject) => {
        calls.push({ options, finish: () => resolve(stored), fail: reject })
        options.signal.addEventListener('abort', () => reject(new DOMException('stopped', 'AbortError')))
      }),
  )
  return { calls, send }
}

describe('uploads', () => {
  test('an empty file is refused with a sentence and never sent', () => {
    const { send } = held()
    const list = new UploadList({ target, stored: vi.fn(), send })
    list.add([file('empty.csv', 0)])
    expect(list.getUploads()[0]).toMatchObject({
      state: 'refused',
      sentence: expect.stringContaining('empty.csv is empty'),
    })
    expect(send).not.toHaveBeenCalled()
  })

  test('files go one after the other, each asking for its place when its turn comes', async () => {
    const { calls, send } = held()
    const places = vi.fn(target)
    const done = vi.fn()
    const list = new UploadList({ target: places, stored: done, send })
    list.add([file('a.csv', 10), file('b.csv', 10)])
    await vi.waitFor(() => expect(calls.length).toBe(1))
    expect(list.getUploads().map(({ state }) => state)).toEqual(['sending', 'waiting'])
    expect(places).toHaveBeenCalledTimes(1)
    calls[0]!.finish()
    await vi.waitFor(() => expect(calls.length).toBe(2))
    expect(done).toHaveBeenCalledWith(stored)
    expect(list.getUploads().length).toBe(1)
  })

  test('progress tells bytes and rate; when all is sent it says that the bytes are compared', async () => {
    let now = 0
    const { calls, send } = held()
    const list = new UploadList({ target, stored: vi.fn(), send, now: () => now })
    list.add([file('a.csv', 4000)])
    await vi.waitFor(() => expect(calls.length).toBe(1))
    now = 1000
    calls[0]!.options.onProgress({ sent: 1000, total: 4000 })
    expect(list.getUploads()[0]).toMatchObject({ sent: 1000, rate: 1000, state: 'sending' })
    now = 2000
    calls[0]!.options.onProgress({ sent: 4000, total: 4000 })
    const { rate, state } = list.getUploads()[0]!
    expect(state).toBe('checking')
    // Smoothed: between the rate before (1000 B/s) and the one of the last second (3000 B/s).
    expect(rate).toBeGreaterThan(1000)
    expect(rate).toBeLessThan(3000)
  })

  test('a refusal by the server shows its sentence, and the next file goes on', async () => {
    const { calls, send } = held()
    const list = new UploadList({ target, stored: vi.fn(), send })
    list.add([file('a.csv', 10), file('b.csv', 10)])
    await vi.waitFor(() => expect(calls.length).toBe(1))
    calls[0]!.fail(
      new ApiProblem({ code: 'too-large', status: 413, title: 'Too large', detail: 'Over 10 GB.' }),
    )
    await vi.waitFor(() => expect(calls.length).toBe(2))
    expect(list.getUploads()[0]).toMatchObject({ state: 'refused', sentence: 'Over 10 GB.' })
  })

  test('one that is under way or waits can be stopped', async () => {
    const { calls, send } = held()
    const list = new UploadList({ target, stored: vi.fn(), send })
    list.add([file('a.csv', 10), file('b.csv', 10)])
    await vi.waitFor(() => expect(calls.length).toBe(1))
    const [first, second] = list.getUploads()
    list.stop(second!.key)
    list.stop(first!.key)
    await vi.waitFor(() =>
      expect(list.getUploads().map(({ state }) => state)).toEqual(['stopped', 'stopped']),
    )
    expect(send).toHaveBeenCalledTimes(1)
  })
})
