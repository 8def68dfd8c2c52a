// What is shown: by domain, set, grade and area. Every view follows.
import { el } from './dom';
import type { Store } from './store';

export function filtersView(store: Store): HTMLElement | null {
  const { faces } = store.page;
  if (faces.length === 0) return null;
  const tell = () => store.tell('filters');
  const group = (title: string, values: string[], chosen: Set<string>) => values.length < 2 ? null : el('fieldset', {}, el('legend', {}, title),
    ...values.map(v => {
      const input = el('input', { type: 'checkbox', checked: true, 'data-value': v, change: () => { if (input.checked) chosen.add(v); else chosen.delete(v); tell(); } });
      return el('label', {}, input, ` ${v}`);
    }));
  const set = el('select', { id: 'filter-set', change: () => { store.filters.set = set.value; tell(); } }, el('option', { value: '' }, 'all'));
  for (const s of store.sets) set.append(el('option', { value: s }, s));
  if (faces.some(f => f.set === '')) set.append(el('option', { value: 'none' }, 'in no set'));
  const least = faces.reduce((a, f) => Math.min(a, f.area), Infinity), most = faces[0]!.area;
  // By powers: half of all faces are smaller than a twentieth of the largest.
  const slider = el('input', { type: 'range', id: 'filter-area', min: '0', max: '100', value: '0' });
  const said = el('output', { for: 'filter-area' });
  const area = () => (slider.value === '0' ? 0 : least * (most / least) ** (Number(slider.value) / 100));
  const words = () => {
    const text = area() === 0 ? 'all' : `${area() < 1 ? area().toPrecision(2) : area().toFixed(1)} m²`;
    said.textContent = text;
    slider.setAttribute('aria-valuetext', text);
  };
  slider.addEventListener('input', () => { store.filters.areaM2 = area(); words(); tell(); });
  words();
  const total = el('p', { class: 'total', 'aria-live': 'polite' });
  const show = () => { total.textContent = `${store.shownFaces.length.toLocaleString('en-US')} of ${faces.length.toLocaleString('en-US')} faces shown`; };
  store.listen(change => { if (change !== 'choice') show(); });
  show();
  return el('form', { class: 'filters', 'aria-label': 'What is shown', submit: (e => e.preventDefault()) as EventListener },
    group('Domain', store.domains, store.filters.domains), group('Grade', store.grades, store.filters.grades),
    store.sets.length ? el('label', { class: 'field' }, el('span', {}, 'Set'), set) : null,
    el('label', { class: 'field' }, el('span', {}, 'Area from'), slider, said), total);
}
