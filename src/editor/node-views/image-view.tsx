import { NodeViewWrapper, type ReactNodeViewProps } from '@tiptap/react'
import { TextButton } from '../../ui/button.tsx'
import { useEditorParts } from '../editor-parts.ts'

/** A picture with its caption; what it shows is also said in words for those who cannot see it. */
export function ImageView({ node, editor, updateAttributes, deleteNode }: ReactNodeViewProps) {
  const parts = useEditorParts()
  const { fileId, alt, caption, width } = node.attrs as {
    fileId: string
    alt: string
    caption: string
    width: number | null
  }
  return (
    <NodeViewWrapper className="hs-picture" contentEditable={false}>
      <img src={parts.imageAddress(fileId)} alt={alt} width={width ?? undefined} />
      {editor.isEditable ? (
        <span className="hs-picture-words">
          <input
            aria-label="Caption"
            placeholder="Caption"
            maxLength={2000}
            value={caption}
            onChange={(event) => updateAttributes({ caption: event.target.value })}
          />
          <input
            aria-label="What the picture shows, in words"
            placeholder="What it shows, for those who cannot see it"
            maxLength={2000}
            value={alt}
            onChange={(event) => updateAttributes({ alt: event.target.value })}
          />
          <TextButton onClick={deleteNode}>Remove</TextButton>
        </span>
      ) : (
        caption && <span className="hs-picture-caption">{caption}</span>
      )}
    </NodeViewWrapper>
  )
}
