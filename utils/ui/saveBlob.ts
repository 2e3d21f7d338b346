/** Hands a file to the browser's downloads. */
export function saveBlob(blob: Blob, fileName: string): void {
  const address = URL.createObjectURL(blob)
  const link = document.createElement('a')
  link.href = address
  link.download = fileName
  link.click()
  // The download starts in the next task: the address must live until then.
  setTimeout(() => URL.revokeObjectURL(address), 1000)
}
