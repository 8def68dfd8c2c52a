// What is chosen, in words, and what can be decided about it.
import type { Face } from './data';
import { reader, table } from './data';
import type { Ledger } from './decisions';
import { el } from './dom';
import { words, type Store } from './store';

export function cardView(store: Store, ledger: Ledger): HTMLElement {
  const { report } = store.page;
  const body = el('div', {}), said = el('p', { class: 'hidden', 'aria-live': 'polite' });
  let seed: Face | undefined;   // first pole of a split
  const button = (text: string, act: () => void) => el('button', { type: 'button', click: act }, text);
  const facts = (pairs: [string, string][]) => el('dl', { class: 'facts' }, ...pairs.filter(p => p[1]).flatMap(([k, v]) => [el('dt', {}, k), el('dd', {}, v)]));

  function note(act: (text: string) => void): HTMLElement {
    const input = el('input', { type: 'text', 'aria-label': 'Note', placeholder: 'a note' });
    const go = () => { if (input.value.trim()) { act(input.value.trim()); input.value = ''; } };
    input.addEventListener('keydown', e => { if (e.key === 'Enter') go(); });
    return el('div', { class: 'note-line' }, input, button('Add note', go));
  }

  function ofFace(f: Face): Node[] {
    const sheet = table(report, 'faces'), cell = reader(sheet), c = (n: string) => cell(f.row, n);
    const total = c('cone95_total_deg') && c('cone95_total_deg') !== c('cone95_deg') ? `, with the model's own errors ${c('cone95_total_deg')}°` : '';
    const dropped = store.dropped.has(f.id);
    const move = el('select', { 'aria-label': 'Move to domain', change: () => { if (move.value) ledger.ofFace('domain', f, { domain: move.value }); } }, el('option', { value: '' }, 'move to …'));
    for (const d of ['host', 'dike', 'margin']) if (d !== f.domain) move.append(el('option', { value: d }, d));
    return [
      el('p', { class: 'big' }, `Face ${f.id}`),
      el('p', {}, `${words(f)}; 95 % cone ${c('cone95_deg')}°${total} (${f.grade})`),
      facts([['side', f.domain === 'unknown' ? 'not decided' : f.domain], ['set', f.set || 'none'], ['area', `${c('area_m2')} m²`], ['size', `${c('length_m')} m along strike, ${c('height_m')} m along dip`],
        ['waviness', c('waviness_m') ? `${c('waviness_m')} m` : ''], ['in place', c('in_place')], ['by hand', [f.decided, ...ledger.pendingFor(f.id).map(r => `${r['action']} (new)`)].filter(Boolean).join(', ')]]),
      el('div', { class: 'buttons', role: 'group', 'aria-label': 'Decide about this face' },
        dropped ? el('span', {}, 'Dropped in your decisions.') : el('button', { type: 'button', id: 'drop-face', click: () => ledger.ofFace('drop', f) }, 'Drop this face'),
        dropped ? null : move, f.set ? button(`Choose set ${f.set}`, () => store.chooseSet(f.set)) : null),
      note(text => ledger.ofFace('note', f, { note: text })),
      ...(seed && f.set === seed.set && f !== seed ? [el('div', { class: 'buttons' }, button(`Split ${f.set}: this face against face ${seed.id}`, () => {
        ledger.ofSets('split_set', f.domain, { set: f.set, strike_deg: seed!.strike.toFixed(2), dip_deg: seed!.dip.toFixed(2), other_strike_deg: f.strike.toFixed(2), other_dip_deg: f.dip.toFixed(2) });
        seed = undefined;
        draw();
      }))] : []),
      ...(f.set && !seed ? [el('div', { class: 'buttons' }, button(`Begin to split ${f.set} here`, () => { seed = f; draw(); }))] : []),
      ...(seed ? [el('p', { class: 'caption' }, seed === f ? `Now choose a face in the other part of ${seed.set}; each plane will go to the nearer of the two.` : `Splitting ${seed.set} from face ${seed.id}. `), button('Give up the split', () => { seed = undefined; draw(); })] : []),
    ];
  }

  function ofSet(set: string): Node[] {
    const sheet = table(report, 'sets'), cell = reader(sheet), row = sheet.rows.find(r => r[0] === set);
    if (!row) return [el('p', {}, `Set ${set}`)];
    const c = (n: string) => cell(row, n), limits = (n: string) => (c(`${n}_low95_m`) ? ` (95 %: ${c(`${n}_low95_m`)} to ${c(`${n}_high95_m`)})` : '');
    const join = el('select', { 'aria-label': 'Join with set', change: () => {
      const other = sheet.rows.find(r => r[0] === join.value);
      if (other) ledger.ofSets('join_sets', c('domain'), { set, other_set: join.value, strike_deg: c('strike_deg'), dip_deg: c('dip_deg'), other_strike_deg: cell(other, 'strike_deg'), other_dip_deg: cell(other, 'dip_deg') });
    } }, el('option', { value: '' }, 'join with …'));
    const others = sheet.rows.filter(r => cell(r, 'domain') === c('domain') && r[0] !== set && cell(r, 'zone') === '');
    for (const r of others) join.append(el('option', { value: r[0]! }, r[0]!));
    return [
      el('p', { class: 'big' }, `Set ${set}`),
      el('p', {}, `Mean strike ${c('strike_deg')}°, dip ${c('dip_deg')}°; 95 % cone of the mean ${c('cone95_deg')}°`),
      facts([['faces', c('count')], ['kappa', c('kappa')], ['spacing', c('spacing_mean_m') ? `${c('spacing_mean_m')} m${limits('spacing')}` : 'not determined'], ['P32', c('p32_per_m') ? `${c('p32_per_m')} per m` : ''], ['came back in', c('stability') ? `${Math.round(Number(c('stability')) * 100)} % of redrawn outcrops` : ''], ['by hand', c('decided')]]),
      el('div', { class: 'buttons' }, others.length ? join : null),
      el('p', { class: 'caption' }, 'To split it, choose one of its faces and begin there.'),
      note(text => ledger.ofSets('note', c('domain'), { set, strike_deg: c('strike_deg'), dip_deg: c('dip_deg'), note: text })),
    ];
  }

  function ofContact(index: number): Node[] {
    const sheet = table(report, 'contacts'), cell = reader(sheet), row = sheet.rows[index]!, c = (n: string) => cell(row, n), contact = report.contacts[index]!;
    const plane = c('constraint') === 'plane';
    return [
      el('p', { class: 'big' }, `Contact of dike ${c('dike')}, margin ${c('margin')}`),
      el('p', {}, plane ? `strike ${c('strike_deg')}°, dip ${c('dip_deg')}°; 95 % cone ${c('cone95_deg')}°` : 'a direction only: the trace is too straight for a dip'),
      facts([['chainage', `${c('chainage_from_m')} to ${c('chainage_to_m')} m`], ['evidence', c('evidence').replaceAll('_', ' ')], ['relief', `${c('relief_m')} m`], ['faces', c('margin_facing')], ['by hand', c('decided')]]),
      el('div', { class: 'buttons' }, button('Confirm this contact', () => ledger.ofContact('confirm_contact', contact, plane ? c('strike_deg') : '', c('dip_deg')))),
      note(text => ledger.ofContact('note', contact, plane ? c('strike_deg') : '', c('dip_deg'), { note: text })),
    ];
  }

  function ofStation(index: number): Node[] {
    const sheet = table(report, 'stations'), cell = reader(sheet), row = sheet.rows[index]!, c = (n: string) => cell(row, n), s = report.stations[index]!;
    const range = (low: string, high: string) => (c(low) ? ` (95 %: ${c(low)} to ${c(high)})` : '');
    return [
      el('p', { class: 'big' }, `Dike ${s.dike}, station ${s.station}`),
      el('p', {}, c('true_width_m') ? `true width ${c('true_width_m')} m${range('true_width_low95_m', 'true_width_high95_m')}` : c('status').replaceAll('_', ' ')),
      facts([['chainage', `${c('chainage_m')} m`], ['with the model’s own errors', c('true_width_total_low95_m') ? `${c('true_width_total_low95_m')} to ${c('true_width_total_high95_m')} m` : ''],
        ['at least', c('visible_width_m') ? `${c('visible_width_m')} m` : ''], ['attitude', c('strike_deg') ? `strike ${c('strike_deg')}°, dip ${c('dip_deg')}°` : ''], ['leans to B by', c('lean_to_b_deg') ? `${c('lean_to_b_deg')}°` : '']]),
      note(text => ledger.ofPlace(s.place, text)),
      el('p', { class: 'nothing' }, 'No face, set or contact is chosen: choose a pole, a face in the map or in three dimensions, a row of a table, or a bar of evidence on the strip.'),
    ];
  }

  function draw(): void {
    const { contact, set } = store.choice, face = store.face;
    body.replaceChildren(...(face ? ofFace(face) : contact >= 0 ? ofContact(contact) : set ? ofSet(set)
      : report.stations[store.choice.station] ? ofStation(store.choice.station)
      : [el('p', { class: 'nothing' }, 'Nothing is chosen. Choose a pole, a face in the map or in three dimensions, a row of a table, or a bar of evidence on the strip.')]));
    body.dataset['face'] = String(face?.id ?? '');
    said.textContent = face ? `Face ${face.id}: ${words(face)}` : set ? `Set ${set}` : '';
  }

  store.listen(draw);
  draw();
  return el('section', { class: 'view card', id: 'card', 'aria-labelledby': 'card-title' }, el('div', { class: 'head' }, el('h3', { id: 'card-title' }, 'Chosen')), body, said);
}
