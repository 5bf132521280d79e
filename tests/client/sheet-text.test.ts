import type { Editor } from '@tiptap/core'
import { Node } from '@tiptap/pm/model'
import { EditorState, TextSelection } from '@tiptap/pm/state'
import { describe, expect, test } from 'vitest'
import { documentSchema } from '../../server/document/index.ts'
import { insertBlocks, moveBlock, succeedCalculation } from '../../src/editor/place.ts'
import { triggerAt } from '../../src/editor/trigger.ts'

const c1 = '00000000-0000-4000-8000-0000000000c1'
const c2 = '00000000-0000-4000-8000-0000000000c2'
const paragraph = (...content: object[]) => ({ type: 'paragraph', content })
const words = (text: string) => ({ type: 'text', text })
const calculation = (calculationId: string) => ({ type: 'calculation', attrs: { calculationId } })
const quote = (calculationId: string) => ({ type: 'quotedResult', attrs: { calculationId, pointer: '/g2' } })

function stateOf(...content: object[]): EditorState {
  const doc = Node.fromJSON(documentSchema, { type: 'doc', content })
  return EditorState.create({ doc, selection: TextSelection.atEnd(doc) })
}

const typesIn = (state: EditorState) => state.doc.children.map((node) => node.type.name)

describe('signs that open the menu', () => {
  const at = (text: string) => triggerAt(stateOf(paragraph(words(text))))

  test.each([
    ['/', 'insert', ''],
    ['Then /tab', 'insert', 'tab'],
    ['g2 =', 'figure', ''],
    ['about (=C3', 'figure', 'C3'],
  ])('%s', (text, kind, query) => expect(at(text)).toMatchObject({ kind, query }))

  test.each([['and/or'], ['a = 5'], ['a=b'], ['1 / 2'], ['https://a.example/x']])('%s is only text', (text) =>
    expect(at(text)).toBeNull(),
  )

  test('what a choice replaces reaches from the sign to the cursor', () => {
    const state = stateOf(paragraph(words('see =C1')))
    const trigger = triggerAt(state)!
    expect(state.doc.textBetween(trigger.from, trigger.to)).toBe('=C1')
  })

  test('program text has no menu', () => {
    expect(triggerAt(stateOf({ type: 'codeBlock', content: [words('/')] }))).toBeNull()
  })
})

describe('blocks', () => {
  function inserted(...content: object[]): EditorState {
    let state = stateOf(...content)
    const editor = {
      get state() {
        return state
      },
      view: { dispatch: (transaction: EditorState['tr']) => (state = state.apply(transaction)) },
    }
    insertBlocks(editor as unknown as Editor, [calculation(c1), calculation(c2)])
    return state
  }

  test('go after the block with the cursor, with a line to go on', () => {
    const state = inserted(paragraph(words('Text.')))
    expect(typesIn(state)).toEqual(['paragraph', 'calculation', 'calculation', 'paragraph'])
    expect(state.selection.$from.parent).toBe(state.doc.lastChild)
  })

  test('take the place of an empty line', () => {
    expect(typesIn(inserted(paragraph(words('Text.')), paragraph()))).toEqual([
      'paragraph',
      'calculation',
      'calculation',
      'paragraph',
    ])
  })

  test('move over their neighbour and stop at the ends', () => {
    const state = stateOf(paragraph(words('Text.')), calculation(c1))
    const pos = state.doc.firstChild!.nodeSize
    const moved = state.apply(moveBlock(state, pos, -1)!)
    expect(typesIn(moved)).toEqual(['calculation', 'paragraph'])
    expect(moveBlock(moved, 0, -1)).toBeNull()
    expect(typesIn(moved.apply(moveBlock(moved, 0, 1)!))).toEqual(['paragraph', 'calculation'])
  })

  test('a successor takes the place of its calculation in the block and in every quoted figure', () => {
    const state = stateOf(paragraph(words('It is '), quote(c1), words('.')), calculation(c1), calculation(c2))
    const ids: unknown[] = []
    state.apply(succeedCalculation(state, c1, 'new')).doc.descendants((node) => {
      if (node.attrs.calculationId) ids.push(node.attrs.calculationId)
    })
    expect(ids).toEqual(['new', 'new', c2])
  })
})
