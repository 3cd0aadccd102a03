/** A file name that every system takes, made from a study's name. */
export function fileNameFor(name: string, suffix: string): string {
  // Everything but letters, digits and a few signs; Windows also refuses names that end in a point or a space.
  const plain = name
    .normalize('NFC')
    .replaceAll(/[^\p{L}\p{N} ._()-]+/gu, ' ')
    .replaceAll(/\s+/g, ' ')
    .slice(0, 80)
    .replaceAll(/^[ .]+|[ .]+$/g, '')
  return `${plain === '' ? 'study' : plain}${suffix}`
}
