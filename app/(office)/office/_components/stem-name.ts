/** A first stem is called by its tree's tag alone, a second one 12b. */
export function stemName(tag: string, label: string): string {
  return label === 'a' || label === '1' ? tag : `${tag}${label}`;
}
