/** An attribute that travels through copy and paste as `data-<name>`. */
export function dataAttribute<T extends string | null>(name: string, fallback: T) {
  return {
    default: fallback,
    parseHTML: (element: HTMLElement): string | T => element.getAttribute(`data-${name}`) ?? fallback,
    renderHTML: (attributes: Record<string, unknown>) => {
      const value = attributes[camelCase(name)]
      return typeof value === 'string' ? { [`data-${name}`]: value } : {}
    },
  }
}

function camelCase(name: string): string {
  return name.replace(/-([a-z])/g, (_, letter: string) => letter.toUpperCase())
}
