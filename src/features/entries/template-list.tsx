import type { ReactNode } from 'react'
import { templates, type Template } from './experiments.ts'

interface TemplateListProps {
  onChoose: (template: Template) => void
  /** A small drawing of the set-up. */
  picture: (template: Template) => ReactNode
  withAbout?: boolean
}

/** Templates as cards with their set-up. Put them into a grid. */
export function TemplateList({ onChoose, picture, withAbout = false }: TemplateListProps) {
  return templates.map((template) => (
    <button
      type="button"
      className="hs-template"
      key={template.experiment}
      onClick={() => onChoose(template)}
    >
      {picture(template)}
      {withAbout ? <b>{template.name}</b> : <span>{template.name}</span>}
      {withAbout && <span className="hs-quiet">{template.about}</span>}
    </button>
  ))
}
