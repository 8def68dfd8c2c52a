// The program's tables, cell for cell: sorted by any column, filtered with the views, copied as CSV.
import type { Table } from './data';
import { table } from './data';
import { copy, csv, save } from './csv';
import { count, el } from './dom';
import type { Store } from './store';

const PAGE = 60;
const SHORT: Record<string, string[]> = {
  faces: ['face_id', 'domain', 'set', 'strike_deg', 'dip_deg', 'cone95_deg', 'cone95_total_deg', 'area_m2', 'length_m', 'height_m', 'grade', 'in_place', 'decided'],
  stations: ['dike', 'station', 'chainage_m', 'true_width_m', 'true_width_low95_m', 'true_width_high95_m', 'status', 'visible_width_m', 'lean_to_b_deg'],
  contacts: ['dike', 'margin', 'segment', 'chainage_from_m', 'chainage_to_m', 'constraint', 'strike_deg', 'dip_deg', 'cone95_deg', 'lean_to_b_deg', 'evidence', 'decided'],
  sets: ['set', 'domain', 'zone', 'count', 'strike_deg', 'dip_deg', 'cone95_deg', 'kappa', 'spacing_mean_m', 'spacing_low95_m', 'spacing_high95_m', 'p32_per_m', 'stability', 'decided'],
  decisions: ['line', 'action', 'applied', 'found', 'matched_face_id', 'domain', 'set', 'other_set', 'margin', 'note', 'decided_by', 'decided_on'],
};
const NAMES: Record<string, string> = { faces: 'Faces', stations: 'Stations', contacts: 'Contacts', sets: 'Sets', decisions: 'Decisions' };

export function tablesView(store: Store): HTMLElement {
  const present = ['faces', 'sets', 'stations', 'contacts', 'decisions'].map(n => table(store.page.report, n)).filter(t => t.rows.length > 0);
  if (present.length === 0) return el('section', { class: 'tables' }, el('p', {}, 'There is no row in any table.'));
  const tabs = el('div', { role: 'tablist', 'aria-label': 'Tables' }), body = el('div', { role: 'tabpanel', id: 'table-panel', tabindex: '-1' });
  const views = present.map(t => new TableView(t, store));
  let open = 0;
  const buttons = present.map((t, i) => el('button', {
    type: 'button', role: 'tab', id: `tab-${t.name}`, 'aria-controls': 'table-panel', click: () => show(i),
    keydown: (e => {
      const step = (e as KeyboardEvent).key === 'ArrowRight' ? 1 : (e as KeyboardEvent).key === 'ArrowLeft' ? -1 : 0;
      if (!step) return;
      show((open + step + present.length) % present.length);
      buttons[open]!.focus();
    }) as EventListener,
  }, `${NAMES[t.name]} (${t.rows.length.toLocaleString('en-US')})`));
  tabs.append(...buttons);
  function show(i: number): void {
    open = i;
    buttons.forEach((b, k) => {
      b.setAttribute('aria-selected', String(k === i));
      b.tabIndex = k === i ? 0 : -1;
    });
    body.setAttribute('aria-labelledby', buttons[i]!.id);
    body.replaceChildren(views[i]!.node);
    views[i]!.fill();
  }
  store.listen(change => {
    if (change === 'choice') {
      const want = store.choice.face >= 0 ? 'faces' : store.choice.contact >= 0 ? 'contacts' : store.choice.set ? 'sets' : '';
      const i = present.findIndex(t => t.name === want);
      if (i >= 0 && i !== open) show(i);
    }
    views[open]!.fill(change === 'choice');
  });
  show(0);
  return el('section', { class: 'tables', 'aria-labelledby': 'tables-title' }, el('h3', { id: 'tables-title' }, 'Tables'), tabs, body);
}

class TableView {
  readonly node: HTMLElement;
  private sort = -1;
  private down = false;
  private page = 0;
  private all = false;
  private readonly grid = el('div', { class: 'scroll', tabindex: '0', role: 'region' });
  private readonly said = el('span', { class: 'said', 'aria-live': 'polite' });
  private readonly pages = el('span', { class: 'pages' });

  constructor(private readonly table: Table, private readonly store: Store) {
    this.grid.setAttribute('aria-label', table.title);
    const every = el('input', { type: 'checkbox', change: () => { this.all = every.checked; this.fill(); } });
    this.node = el('div', {},
      el('div', { class: 'bar' }, this.pages, el('label', {}, every, ' all columns'),
        el('button', { type: 'button', click: () => void this.copy() }, 'Copy as CSV'),
        el('button', { type: 'button', click: () => save(table.file, this.text()) }, 'Save as CSV'), this.said),
      this.grid);
  }

  private get columns(): number[] {
    const names = SHORT[this.table.name]!;
    const wanted = this.all ? this.table.columns.map((_, i) => i) : names.map(n => this.table.columns.findIndex(c => c.name === n)).filter(i => i >= 0);
    return this.all ? wanted : wanted.filter(i => i === 0 || this.table.rows.some(r => r[i] !== ''));
  }

  private order(): number[] {
    const rows = this.table.rows;
    let at = rows.map((_, i) => i);
    if (this.table.name === 'faces') at = at.filter(i => this.store.shown[i]);
    if (this.table.name === 'sets' && this.store.filters.set) at = at.filter(i => rows[i]![0] === this.store.filters.set);
    if (this.sort < 0) return at;
    const text = this.table.columns[this.sort]!.text, sign = this.down ? -1 : 1, c = this.sort;
    // What is not determined stays at the end whichever way one sorts.
    return at.sort((a, b) => {
      const x = rows[a]![c]!, y = rows[b]![c]!;
      if ((x === '') !== (y === '')) return x === '' ? 1 : -1;
      return (text ? x.localeCompare(y, 'en', { numeric: true }) : Number(x) - Number(y)) * sign || a - b;
    });
  }

  private chosenRow(): number {
    const { face, contact, station, set } = this.store.choice;
    switch (this.table.name) {
      case 'faces': return face;
      case 'contacts': return contact;
      case 'stations': return station;
      case 'sets': return set ? this.table.rows.findIndex(r => r[0] === set) : -1;
      default: return -1;
    }
  }

  private choose(row: number): void {
    switch (this.table.name) {
      case 'faces': this.store.chooseFace(row); break;
      case 'contacts': this.store.chooseContact(row); break;
      case 'stations': this.store.chooseStation(row); break;
      case 'sets': this.store.chooseSet(this.table.rows[row]![0]!); break;
    }
  }

  fill(follow = false): void {
    const order = this.order(), columns = this.columns, chosen = this.chosenRow(), last = Math.max(0, Math.ceil(order.length / PAGE) - 1);
    if (follow && chosen >= 0 && order.includes(chosen)) this.page = Math.floor(order.indexOf(chosen) / PAGE);
    this.page = Math.min(this.page, last);
    const head = el('tr', {}, ...columns.map(c => {
      const column = this.table.columns[c]!, dir = c === this.sort ? (this.down ? 'descending' : 'ascending') : 'none';
      const label = column.name.split('_').flatMap((part, i) => (i ? ['_', el('wbr'), part] : [part]));
      return el('th', { scope: 'col', 'aria-sort': dir, ...(column.text ? { class: 'word' } : {}) },
        el('button', { type: 'button', title: column.meaning, click: () => { this.down = c === this.sort && !this.down; this.sort = c; this.page = 0; this.fill(); } },
          ...label, dir === 'none' ? null : el('span', { 'aria-hidden': 'true' }, this.down ? ' ▾' : ' ▴')));
    }));
    const rows = order.slice(this.page * PAGE, (this.page + 1) * PAGE).map(i => {
      const row = this.table.rows[i]!;
      const tr = el('tr', { tabindex: '0', 'data-row': String(i), click: () => this.choose(i), keydown: (e => this.key(e as KeyboardEvent, i)) as EventListener },
        ...columns.map((c, k) => el(k ? 'td' : 'th', k ? (this.table.columns[c]!.text ? { class: 'word' } : {}) : { scope: 'row' }, row[c]!)));
      if (this.table.name === 'faces') tr.dataset['face'] = row[0]!;
      if (i === chosen) {
        tr.classList.add('chosen');
        tr.setAttribute('aria-selected', 'true');
      }
      return tr;
    });
    const focused = this.grid.contains(document.activeElement) ? (document.activeElement as HTMLElement).dataset['row'] : undefined;
    this.grid.replaceChildren(el('table', {}, el('caption', { class: 'hidden' }, this.table.title), el('thead', {}, head), el('tbody', {}, ...rows)));
    if (focused) this.grid.querySelector<HTMLElement>(`tr[data-row="${focused}"]`)?.focus({ preventScroll: true });
    if (follow) this.scrollTo(this.grid.querySelector<HTMLElement>('tr.chosen'));
    const step = (by: number, text: string, label: string) => el('button', {
      type: 'button', 'aria-label': label, disabled: this.page + by < 0 || this.page + by > last, click: () => { this.page += by; this.fill(); },
    }, text);
    const from = order.length ? this.page * PAGE + 1 : 0, to = Math.min(order.length, (this.page + 1) * PAGE);
    this.pages.replaceChildren(step(-1, '‹', 'Rows before'), ` ${from} to ${to} of ${count(order.length, 'row', 'rows')} `, step(1, '›', 'Rows after'));
  }

  // Only the table's own box scrolls, never the page under the reader.
  private scrollTo(row: HTMLElement | null): void {
    if (!row) return;
    const top = row.offsetTop - this.grid.clientHeight / 2;
    this.grid.scrollTop = Math.max(0, top);
  }

  private key(e: KeyboardEvent, row: number): void {
    const at = e.currentTarget as HTMLElement;
    if (e.key === 'Enter' || e.key === ' ') this.choose(row);
    else if (e.key === 'ArrowDown') (at.nextElementSibling as HTMLElement | null)?.focus();
    else if (e.key === 'ArrowUp') (at.previousElementSibling as HTMLElement | null)?.focus();
    else return;
    e.preventDefault();
  }

  private text(): string {
    const columns = this.columns;
    return csv(columns.map(c => this.table.columns[c]!.name), this.order().map(i => columns.map(c => this.table.rows[i]![c]!)));
  }

  private async copy(): Promise<void> {
    this.said.textContent = (await copy(this.text())) ? `${count(this.order().length, 'row', 'rows')} copied.` : 'The browser does not allow copying; save the file instead.';
  }
}
