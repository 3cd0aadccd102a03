/** The canvas on its paper as a PNG on the clipboard. Rejects where the window may not write there. */
export async function copyPicture(canvas: HTMLCanvasElement, paper: string): Promise<void> {
  const sheet = document.createElement('canvas')
  sheet.width = canvas.width
  sheet.height = canvas.height
  const ctx = sheet.getContext('2d')
  if (ctx === null) throw new Error('This window cannot draw pictures.')
  ctx.fillStyle = paper
  ctx.fillRect(0, 0, sheet.width, sheet.height)
  ctx.drawImage(canvas, 0, 0)
  const blob = await new Promise<Blob | null>((resolve) => {
    sheet.toBlob(resolve, 'image/png')
  })
  if (blob === null) throw new Error('The picture could not be made.')
  await navigator.clipboard.write([new ClipboardItem({ 'image/png': blob })])
}
