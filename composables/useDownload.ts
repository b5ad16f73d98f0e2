/** Gives the browser a file that was made on the page. */
export function useDownload() {
  return (name: string, content: string | Blob, type = 'text/csv;charset=utf-8') => {
    const url = URL.createObjectURL(typeof content === 'string' ? new Blob([content], { type }) : content)
    const link = document.createElement('a')
    link.href = url
    link.download = name
    link.click()
    setTimeout(() => URL.revokeObjectURL(url), 1000)
  }
}
