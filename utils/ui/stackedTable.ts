/**
 * Laying out rows as entries takes table semantics away in some browsers, and the headings out of sight in all.
 * Gives the parts of the table their roles back and each cell its heading as `data-label`.
 */
export function describeStackedTable(table: HTMLTableElement): void {
  table.setAttribute('role', 'table')
  for (const group of [table.tHead, ...table.tBodies, table.tFoot]) group?.setAttribute('role', 'rowgroup')
  const headings = [...(table.tHead?.rows[0]?.cells ?? [])].map((cell) => cell.textContent?.trim() ?? '')
  for (const row of table.rows) describeRow(row, headings)
}

function describeRow(row: HTMLTableRowElement, headings: string[]): void {
  row.setAttribute('role', 'row')
  const labelled = row.cells.length === headings.length
  for (const [index, cell] of [...row.cells].entries()) {
    const isHeading = cell.tagName === 'TH'
    cell.setAttribute('role', isHeading ? (cell.scope === 'row' ? 'rowheader' : 'columnheader') : 'cell')
    const label = headings[index]
    if (labelled && !isHeading && label && !cell.dataset.label) cell.dataset.label = label
  }
}
