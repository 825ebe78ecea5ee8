import { find } from './dom.ts';

/** Filters and order of the table of verdicts; its rows carry their part, force and verdicts as data. */
export function verdictTable(root: HTMLElement, announce: (text: string) => void): void {
  const rows = [...root.querySelectorAll<HTMLTableRowElement>('tbody tr')];
  const body = find<HTMLTableSectionElement>(root, 'tbody');
  const count = find<HTMLElement>(root, '.count');
  const filters = [...root.querySelectorAll<HTMLSelectElement>('select[data-filter]')];
  const search = root.querySelector<HTMLInputElement>('input[type=search]');
  const differing = root.querySelector<HTMLInputElement>('input[data-filter=differs]');

  const fits = (row: HTMLTableRowElement): boolean =>
    filters.every(
      ({ dataset, value }) => value === '' || (row.dataset[dataset.filter as string] ?? '').split(' ').includes(value),
    ) &&
    (differing?.checked !== true || row.dataset.differs === 'yes') &&
    (search === null || (row.textContent ?? '').toLowerCase().includes(search.value.trim().toLowerCase()));

  const filter = (aloud: boolean) => {
    let shown = 0;
    for (const row of rows) {
      row.hidden = !fits(row);
      if (!row.hidden) shown++;
    }
    count.textContent = `${shown} of ${rows.length} conditions`;
    if (aloud) announce(count.textContent);
  };
  for (const control of [...filters, search, differing]) control?.addEventListener('input', () => filter(true));
  find<HTMLElement>(root, '.filters').hidden = false;

  const headers = [...root.querySelectorAll<HTMLTableCellElement>('th[data-sort]')];
  for (const header of headers) {
    const button = find<HTMLButtonElement>(header, 'button');
    button.addEventListener('click', () => {
      const isUp = header.getAttribute('aria-sort') !== 'ascending';
      for (const other of headers) other.removeAttribute('aria-sort');
      header.setAttribute('aria-sort', isUp ? 'ascending' : 'descending');
      const keyOf = (row: HTMLTableRowElement) =>
        row.cells[header.cellIndex]?.dataset.key ?? row.cells[header.cellIndex]?.textContent ?? '';
      const sorted = [...rows].sort((a, b) => compare(keyOf(a), keyOf(b)));
      body.append(...(isUp ? sorted : sorted.reverse()));
      announce(`sorted by ${button.textContent}, ${isUp ? 'ascending' : 'descending'}`);
    });
  }
  filter(false);
}

/** By number where both are numbers, else by text; what has no key comes last. */
function compare(a: string, b: string): number {
  if (a === '' || b === '') return a === b ? 0 : a === '' ? 1 : -1;
  const difference = Number(a) - Number(b);
  return Number.isNaN(difference) ? a.localeCompare(b, 'en') : difference;
}
