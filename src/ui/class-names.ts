/** Joins the class names that are set; whatever is not a text or is empty is left out, so that `on && 'name'` works. */
export function classNames(...names: unknown[]): string {
  return names.filter((name) => typeof name === 'string' && name !== '').join(' ')
}
