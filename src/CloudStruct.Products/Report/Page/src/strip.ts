// The strip along chainage is drawn by the program; here it gets its cursor. A place chosen on it moves everything else.
import { el, svg } from './dom';
import { reader, table } from './data';
import type { Store } from './store';

interface Mapped { dike: number; left: number; right: number; from: number; to: number; cursor: SVGElement; label: SVGElement; drawing: SVGSVGElement }

export function strips(store: Store): HTMLElement | null {
  const { report } = store.page;
  const mapped: Mapped[] = [];
  for (const drawing of document.querySelectorAll<SVGSVGElement>('.strip svg[data-dike]')) {
    const d = drawing.dataset, box = drawing.viewBox.baseVal;
    const cursor = svg('g', { class: 'cursor' }), label = svg('text', { y: 11, 'text-anchor': 'middle', 'font-weight': 600, fill: '#1a1a1a' });
    cursor.append(svg('line', { x1: 0, x2: 0, y1: 14, y2: Number(d['bottom']), stroke: '#1a1a1a', 'stroke-width': 2 }), svg('path', { d: 'M-6 13L6 13L0 21Z', fill: '#1a1a1a' }), label);
    drawing.append(cursor);
    const m: Mapped = { dike: Number(d['dike']), left: Number(d['left']), right: Number(d['right']), from: Number(d['from']), to: Number(d['to']), cursor, label, drawing };
    mapped.push(m);
    let moving = false;
    const take = (e: PointerEvent) => {
      const r = drawing.getBoundingClientRect(), x = ((e.clientX - r.left) / r.width) * box.width;
      if (x < m.left - 4 || x > m.right + 4) return;
      store.chooseChainage(m.dike, m.from + ((x - m.left) / (m.right - m.left)) * (m.to - m.from));
    };
    drawing.addEventListener('pointerdown', e => {
      if ((e.target as Element).closest('a')) return;
      moving = true;
      take(e);
    });
    drawing.addEventListener('pointermove', e => { if (moving && e.buttons) take(e); });
    window.addEventListener('pointerup', () => { moving = false; });
    for (const link of drawing.querySelectorAll('a')) {
      link.addEventListener('click', e => {
        const [, dike, margin, segment] = /#contact-(\d+)-([AB])-(\d+)/.exec(link.getAttribute('href') ?? '') ?? [];
        const i = report.contacts.findIndex(c => c.dike === Number(dike) && c.margin === margin && c.segment === Number(segment));
        if (i < 0) return;
        e.preventDefault();
        store.chooseContact(i);
      });
    }
  }
  if (report.stations.length === 0) return null;

  const sheet = table(report, 'stations'), cell = reader(sheet);
  const slider = el('input', { type: 'range', id: 'station', step: '1' });
  const words = el('output', { for: 'station', id: 'station-words' });
  const own = () => report.stations.map((s, i) => ({ s, i })).filter(x => x.s.dike === store.choice.dike);
  const dikes = [...new Set(report.stations.map(s => s.dike))];
  const pick = el('select', { 'aria-label': 'Dike', change: () => store.chooseStation(report.stations.findIndex(s => s.dike === Number(pick.value))) });
  for (const d of dikes) pick.append(el('option', { value: String(d) }, `dike ${d}`));
  slider.addEventListener('input', () => store.chooseStation(own()[Number(slider.value)]?.i ?? -1));

  const show = () => {
    const all = own(), s = report.stations[store.choice.station];
    slider.max = String(Math.max(0, all.length - 1));
    slider.value = String(all.findIndex(x => x.i === store.choice.station));
    if (dikes.length > 1) pick.value = String(store.choice.dike);
    for (const m of mapped) {
      const here = s && s.dike === m.dike;
      m.cursor.setAttribute('visibility', here ? 'visible' : 'hidden');
      if (!here) continue;
      const x = m.left + ((s.chainage - m.from) / (m.to - m.from)) * (m.right - m.left);
      m.cursor.setAttribute('transform', `translate(${x.toFixed(2)} 0)`);
      const room = m.drawing.closest('.scroll');
      if (room && room.scrollWidth > room.clientWidth + 4) {
        const px = (x / m.drawing.viewBox.baseVal.width) * room.scrollWidth;
        if (px < room.scrollLeft + 40 || px > room.scrollLeft + room.clientWidth - 40) room.scrollLeft = px - room.clientWidth / 2;
      }
      m.label.textContent = `${s.chainage.toFixed(1)} m`;
      m.drawing.dataset['station'] = String(s.station);
    }
    if (!s) return;
    const row = sheet.rows[store.choice.station]!, width = cell(row, 'true_width_m');
    const text = `chainage ${cell(row, 'chainage_m')} m, station ${s.station}: `
      + (width ? `${width} m wide${cell(row, 'true_width_low95_m') ? ` (${cell(row, 'true_width_low95_m')} to ${cell(row, 'true_width_high95_m')})` : ''}` : cell(row, 'status').replaceAll('_', ' '));
    words.textContent = text;
    slider.setAttribute('aria-valuetext', text);
  };
  store.listen(show);
  show();
  return el('div', { class: 'rail' }, el('label', { for: 'station' }, 'Along chainage'), dikes.length > 1 ? pick : null, slider, words);
}
