// What a geologist decides here, and the file that takes it to the next run.
import type { Contact, Earlier, Face, Vec } from './data';
import { csv, save } from './csv';
import { count, el } from './dom';
import type { Store } from './store';

export type Row = Record<string, string>;
const COLUMNS = ['action', 'face_id', 'x_m', 'y_m', 'z_m', 'strike_deg', 'dip_deg', 'north', 'domain', 'set', 'other_set', 'other_strike_deg', 'other_dip_deg', 'dike', 'margin', 'note', 'decided_by', 'decided_on'];
const FILE = 'decisions.csv';

export class Ledger {
  private readonly pending: Row[] = [];
  private readonly earlier: { row: Row; from: Earlier; kept: boolean }[];
  private saved = true;
  private by = '';
  readonly node = el('section', { class: 'decisions', 'aria-labelledby': 'decisions-title' });

  constructor(private readonly store: Store) {
    this.earlier = store.page.report.decisions.map(d => ({ row: this.again(d), from: d, kept: true }));
    window.addEventListener('beforeunload', e => { if (!this.saved) e.preventDefault(); });
    this.draw();
  }

  ofFace(action: 'drop' | 'domain' | 'note', f: Face, more: Row = {}): void {
    this.add({ action, face_id: String(f.id), ...this.place(f.at), ...this.plane(f.strike, f.dip), ...more });
  }

  ofContact(action: 'confirm_contact' | 'note', c: Contact, strike: string, dip: string, more: Row = {}): void {
    this.add({ action, ...this.place(c.middle), ...(strike ? { strike_deg: strike, dip_deg: dip, north: this.store.page.report.north } : {}), dike: String(c.dike), margin: c.margin, ...more });
  }

  ofSets(action: 'join_sets' | 'split_set' | 'note', domain: string, more: Row): void {
    this.add({ action, domain, north: this.store.page.report.north, ...more });
  }

  ofPlace(at: Vec, text: string): void {
    this.add({ action: 'note', ...this.place(at), note: text });
  }

  pendingFor(face: number): Row[] {
    return this.pending.filter(r => r['face_id'] === String(face));
  }

  private place(at: Vec): Row {
    const [ox, oy, oz] = this.store.page.report.origin;
    return { x_m: (at[0] + ox).toFixed(3), y_m: (at[1] + oy).toFixed(3), z_m: (at[2] + oz).toFixed(3) };
  }

  private plane(strike: number, dip: number): Row {
    return { strike_deg: strike.toFixed(2), dip_deg: dip.toFixed(2), north: this.store.page.report.north };
  }

  private again(d: Earlier): Row {
    const row: Row = { action: d.action, north: d.north, domain: d.domain, set: d.set, other_set: d.otherSet, margin: d.margin, note: d.note, decided_by: d.by, decided_on: d.on };
    if (d.faceId) row['face_id'] = String(d.faceId);
    if (d.dike) row['dike'] = String(d.dike);
    if (d.place) Object.assign(row, { x_m: d.place[0].toFixed(3), y_m: d.place[1].toFixed(3), z_m: d.place[2].toFixed(3) });
    if (d.attitude) Object.assign(row, { strike_deg: d.attitude[0].toFixed(2), dip_deg: d.attitude[1].toFixed(2) });
    if (d.other) Object.assign(row, { other_strike_deg: d.other[0].toFixed(2), other_dip_deg: d.other[1].toFixed(2) });
    return row;
  }

  private add(row: Row): void {
    const now = new Date();
    row['decided_on'] = `${now.getFullYear()}-${String(now.getMonth() + 1).padStart(2, '0')}-${String(now.getDate()).padStart(2, '0')}`;
    this.pending.push(row);
    if (row['action'] === 'drop') this.store.dropped.add(Number(row['face_id']));
    this.changed();
  }

  private changed(): void {
    this.saved = false;
    this.draw();
    this.store.tell('decisions');
  }

  private takeBack(row: Row): void {
    this.pending.splice(this.pending.indexOf(row), 1);
    if (row['action'] === 'drop') this.store.dropped.delete(Number(row['face_id']));
    this.changed();
  }

  private download(): void {
    const rows: Row[] = [...this.earlier.filter(e => e.kept).map(e => e.row), ...this.pending.map(r => ({ ...r, decided_by: this.by }))];
    save(FILE, csv(COLUMNS, rows.map(r => COLUMNS.map(c => r[c] ?? ''))));
    this.saved = true;
    this.draw();
  }

  private draw(): void {
    const name = el('input', { type: 'text', id: 'decided-by', autocomplete: 'name', value: this.by, input: () => { this.by = name.value; } });
    const changed = this.pending.length > 0 || this.earlier.some(e => !e.kept);
    const total = this.pending.length + this.earlier.filter(e => e.kept).length;
    const parts: (Node | null)[] = [
      el('h3', { id: 'decisions-title' }, 'Decisions by hand'),
      el('p', {}, 'Choose a face, a set or a contact above and decide. Nothing changes in this report: put the file that you download here into the survey folder, beside its clouds folder, as decisions.csv, and measure again. A decision whose face is no longer there is reported, not forgotten.'),
      this.pending.length ? el('ul', { class: 'pending', 'aria-label': 'New decisions' }, ...this.pending.map(r => el('li', {}, `${sentence(r)} `, el('button', { type: 'button', click: () => this.takeBack(r) }, 'take back')))) : null,
      this.earlier.length ? el('details', changed ? { open: true } : {}, el('summary', {}, `${count(this.earlier.length, 'decision', 'decisions')} of the file that this run has read`),
        el('ul', {}, ...this.earlier.map(e => el('li', e.kept ? {} : { class: 'taken' }, `${sentence(e.row)} (${e.from.applied ? '' : 'not applied: '}${e.from.found}) `,
          el('button', { type: 'button', click: () => { e.kept = !e.kept; this.changed(); } }, e.kept ? 'take back' : 'keep'))))) : null,
      el('div', { class: 'bar' }, el('label', { for: 'decided-by' }, 'Your name '), name,
        el('button', { type: 'button', id: 'download-decisions', class: 'strong', disabled: !changed, click: () => this.download() }, `Download ${FILE}`),
        el('span', { class: 'said', 'aria-live': 'polite' }, changed ? `${count(total, 'decision', 'decisions')}${this.saved ? ', downloaded' : ', not yet downloaded'}` : 'nothing new')),
    ];
    this.node.replaceChildren(...parts.filter(p => p !== null));
  }
}

function sentence(r: Row): string {
  const note = r['note'] ? ` “${r['note']}”` : '';
  switch (r['action']) {
    case 'drop': return `Drop face ${r['face_id']}.${note}`;
    case 'domain': return `Move face ${r['face_id']} to ${r['domain']}.${note}`;
    case 'join_sets': return `Join ${r['set']} and ${r['other_set']}.${note}`;
    case 'split_set': return `Split ${r['set']} about ${r['strike_deg']}/${r['dip_deg']} and ${r['other_strike_deg']}/${r['other_dip_deg']}.${note}`;
    case 'confirm_contact': return `Confirm the contact of dike ${r['dike']}, margin ${r['margin']}.${note}`;
    default: return `Note on ${r['margin'] ? `dike ${r['dike']}, margin ${r['margin']}` : r['face_id'] ? `face ${r['face_id']}` : r['set'] ? `set ${r['set']}` : 'a place'}:${note}`;
  }
}
