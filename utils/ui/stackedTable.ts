/**
 * Laying out rows as entries takes table semantics away in some browsers, and the headings out of sight in all.
 * Gives the parts of the table their roles back and each cell its heading as `data-label`.
 */
export function describeStackedTable(table: HTMLTableElement): void {
  table.setAttribute('role', 'table')
  for (const group of table.querySelectorAll('thead, tbody, tfoot')) group.setAttribute('role', 'rowgroup')
  const headings = [...(table.querySelector('thead tr')?.children ?? [])].map(wordsOf)
  for (const row of table.querySelectorAll('tr')) describeRow(row, headings)
}

/** What a heading says, without marks such as the arrow of the sorted one. */
function wordsOf(heading: Element): string {
  const copy = heading.cloneNode(true) as Element
  for (const mark of copy.querySelectorAll('[aria-hidden="true"]')) mark.remove()
  return copy.textContent?.trim() ?? ''
}

function describeRow(row: HTMLElement, headings: string[]): void {
  row.setAttribute('role', 'row')
  const cells = [...row.children] as HTMLElement[]
  for (const [index, cell] of cells.entries()) {
    const isHeading = cell.tagName === 'TH'
    const headingRole = cell.getAttribute('scope') === 'row' ? 'rowheader' : 'columnheader'
    cell.setAttribute('role', isHeading ? headingRole : 'cell')
    const label = headings[index]
    if (cells.length === headings.length && !isHeading && label && !cell.dataset.label) cell.dataset.label = label
  }
}
