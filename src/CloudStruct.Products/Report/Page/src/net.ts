// All poles on one equal-area net, lower hemisphere. Choosing a pole chooses its face everywhere.
import type { Face } from './data';
import { CHOSEN, HAIR, INK, QUIET, css, mark, ofSet } from './colours';
import { el, fitted, count } from './dom';
import type { Store } from './store';

const NORTH = { true: 'true north', grid: 'grid north', model: 'the y axis of the model' } as const;

export function netView(store: Store): HTMLElement {
  const { faces, report } = store.page;
  const canvas = el('canvas', {
    id: 'net', tabindex: '0', role: 'application', 'aria-roledescription': 'stereonet', 'aria-describedby': 'net-words',
    'aria-label': 'Stereonet of the poles shown. Arrow keys go from pole to pole.',
  });
  const contours = el('input', { type: 'checkbox', id: 'net-contours' });
  const sentence = el('p', { id: 'net-words', class: 'caption' });
  // Lambert's equal-area projection of the downward pole: r = √2 sin(colatitude / 2), 1 at the rim.
  const xy = faces.map(f => {
    const r = Math.SQRT2 * Math.sin(((90 - f.plunge) * Math.PI) / 360), a = (f.trend * Math.PI) / 180;
    return [r * Math.sin(a), r * Math.cos(a)] as const;
  });
  let cx = 0, cy = 0, radius = 1;
  const place = (f: Face): [number, number] => [cx + radius * xy[f.index]![0], cy - radius * xy[f.index]![1]];

  const redraw = fitted(canvas, (width, height) => {
    const pen = canvas.getContext('2d')!;
    radius = Math.max(10, Math.min(width, height) / 2 - 20);
    [cx, cy] = [width / 2, height / 2 + 4];
    pen.clearRect(0, 0, width, height);
    pen.fillStyle = '#fff';
    pen.beginPath();
    pen.arc(cx, cy, radius, 0, 2 * Math.PI);
    pen.fill();
    rim(pen);
    if (contours.checked) for (const net of report.nets) {
      if (store.filters.domains.has(net.name.replace('net-', ''))) for (const c of net.curves) if (c.kind === 'contour') curve(pen, c.points, QUIET, 0.7, []);
    }
    const shown = store.shownFaces, many = shown.length > 1500;
    const chosenSet = store.choice.set;
    for (const f of [...shown].reverse()) {
      if (f.set === chosenSet && chosenSet) continue;
      dot(pen, f, many, chosenSet ? 0.28 : many ? 0.6 : 0.8);
    }
    if (chosenSet) for (const f of [...shown].reverse()) if (f.set === chosenSet) dot(pen, f, many, 0.95);
    if (chosenSet) for (const net of report.nets) for (const c of net.curves) {
      if (c.group === chosenSet && c.kind !== 'contour') curve(pen, c.points, css(ofSet(chosenSet)), c.kind === 'cone' ? 1.2 : 1.8, c.kind === 'cone' ? [3, 2] : []);
    }
    const face = store.face;
    if (face) {
      const [x, y] = place(face);
      pen.lineWidth = 2.5;
      pen.strokeStyle = INK;
      pen.fillStyle = CHOSEN;
      mark(pen, face.set, x, y, 7.5);
      pen.fill();
      pen.stroke();
    }
    const contact = report.contacts[store.choice.contact];
    if (contact?.normal) plane(pen, contact.normal);
    canvas.dataset['face'] = String(face?.id ?? '');
    const weight = store.choice.set ? ` Set ${store.choice.set} is marked, with its mean plane and the cone of its mean.` : '';
    sentence.textContent = `${count(shown.length, 'pole', 'poles')} of ${faces.length.toLocaleString('en-US')}, equal area, lower hemisphere, azimuths from ${NORTH[report.north]}, each face counted once.${weight}${contours.checked ? ' Contours are those of the whole domain, in standard deviations above uniform.' : ''}`;
  });

  // A contact: its pole, and its great circle. The normal is in the grid's frame, the net about the stated north.
  function plane(pen: CanvasRenderingContext2D, n: readonly number[]): void {
    const turn = (report.turn * Math.PI) / 180, down = n[2]! > 0 ? -1 : 1;
    const trend = Math.atan2(down * n[0]!, down * n[1]!) + turn, plunge = Math.asin(Math.min(1, Math.abs(n[2]!)));
    const at = (t: number, p: number): [number, number] => {
      const r = Math.SQRT2 * Math.sin((Math.PI / 2 - p) / 2);
      return [r * Math.sin(t), r * Math.cos(t)];
    };
    const dip = Math.PI / 2 - plunge, strike = trend + Math.PI / 2;
    const points: [number, number][] = [];
    for (let i = 0; i <= 60; i++) {
      const rake = (i * Math.PI) / 60;
      points.push(at(strike + Math.atan2(Math.sin(rake) * Math.cos(dip), Math.cos(rake)), Math.asin(Math.sin(rake) * Math.sin(dip))));
    }
    curve(pen, points, INK, 1.6, []);
    const [x, y] = at(trend, plunge);
    pen.lineWidth = 2.5;
    pen.strokeStyle = INK;
    pen.fillStyle = CHOSEN;
    mark(pen, 'contact-2', cx + radius * x, cy - radius * y, 7);
    pen.fill();
    pen.stroke();
  }

  function rim(pen: CanvasRenderingContext2D): void {
    pen.strokeStyle = INK;
    pen.lineWidth = 1.2;
    pen.beginPath();
    pen.arc(cx, cy, radius, 0, 2 * Math.PI);
    pen.stroke();
    for (let a = 0; a < 360; a += 10) {
      const s = Math.sin((a * Math.PI) / 180), c = Math.cos((a * Math.PI) / 180), long = a % 90 === 0 ? 6 : a % 30 === 0 ? 4 : 2.5;
      line(pen, cx + radius * s, cy - radius * c, cx + (radius + long) * s, cy - (radius + long) * c, INK, 0.8);
    }
    line(pen, cx - 4, cy, cx + 4, cy, HAIR, 1);
    line(pen, cx, cy - 4, cx, cy + 4, HAIR, 1);
    if (report.north !== 'model') {
      pen.fillStyle = INK;
      pen.font = '600 13px system-ui, sans-serif';
      pen.textAlign = 'center';
      pen.fillText('N', cx, cy - radius - 9);
    }
  }

  function dot(pen: CanvasRenderingContext2D, f: Face, many: boolean, alpha: number): void {
    const [x, y] = place(f), size = (many ? 1.8 : 2.4) + (many ? 0.5 : 1) * Math.min(2, Math.sqrt(f.area));
    mark(pen, f.set, x, y, size);
    if (f.set) {
      pen.fillStyle = css(ofSet(f.set), alpha);
      pen.fill();
    } else {
      pen.strokeStyle = css(ofSet(''), alpha);
      pen.lineWidth = 0.9;
      pen.stroke();
    }
  }

  function curve(pen: CanvasRenderingContext2D, points: [number, number][], colour: string, width: number, dash: number[]): void {
    pen.beginPath();
    points.forEach(([x, y], i) => (i ? pen.lineTo(cx + radius * x, cy - radius * y) : pen.moveTo(cx + radius * x, cy - radius * y)));
    pen.setLineDash(dash);
    pen.strokeStyle = colour;
    pen.lineWidth = width;
    pen.stroke();
    pen.setLineDash([]);
  }

  const nearest = (x: number, y: number, most: number, ahead?: [number, number]): number => {
    let best = -1, least = most;
    for (const f of faces) {
      if (!store.shown[f.index] || (ahead && f.index === store.choice.face)) continue;
      const [px, py] = place(f), dx = px - x, dy = py - y, along = ahead ? dx * ahead[0] + dy * ahead[1] : 1;
      if (along <= 0) continue;
      const off = ahead ? along + 3 * Math.abs(dx * ahead[1] - dy * ahead[0]) : Math.hypot(dx, dy);
      if (off < least) [best, least] = [f.index, off];
    }
    return best;
  };
  canvas.addEventListener('click', e => {
    const found = nearest(e.offsetX, e.offsetY, 14);
    if (found >= 0 || store.face) store.chooseFace(found);
  });
  canvas.addEventListener('keydown', e => {
    const way = ({ ArrowLeft: [-1, 0], ArrowRight: [1, 0], ArrowUp: [0, -1], ArrowDown: [0, 1] } as Record<string, [number, number]>)[e.key];
    if (e.key === 'Escape') store.chooseFace(-1);
    if (!way) return;
    e.preventDefault();
    const face = store.face;
    const found = face && store.shown[face.index] ? nearest(...place(face), Infinity, way) : nearest(cx, cy, Infinity);
    if (found >= 0) store.chooseFace(found);
  });
  contours.addEventListener('change', redraw);
  store.listen(redraw);
  // Where a face lies, for whoever drives the page from outside.
  canvas.addEventListener('where', e => {
    const ask = (e as CustomEvent<{ id: number; x?: number; y?: number }>).detail, f = store.page.byId.get(ask.id);
    if (f) [ask.x, ask.y] = place(f);
  });
  return el('section', { class: 'view net', 'aria-labelledby': 'net-title' },
    el('div', { class: 'head' }, el('h3', { id: 'net-title' }, 'Poles'), el('label', {}, contours, ' contours')), canvas, key(store), sentence);
}

// Every set with its mark; choosing one marks its poles.
function key(store: Store): HTMLElement | null {
  if (store.sets.length === 0) return null;
  const chips = store.sets.map(set => {
    const dot = el('canvas', { width: '28', height: '28', 'aria-hidden': 'true' }), pen = dot.getContext('2d')!;
    mark(pen, set, 14, 14, 9);
    pen.fillStyle = css(ofSet(set));
    pen.fill();
    return el('button', { type: 'button', 'data-set': set, 'aria-pressed': 'false', click: () => store.chooseSet(store.choice.set === set && store.choice.face < 0 ? '' : set) }, dot, ` ${set}`);
  });
  const show = () => { for (const c of chips) c.setAttribute('aria-pressed', String(c.dataset['set'] === store.choice.set)); };
  store.listen(show);
  return el('div', { class: 'key', role: 'group', 'aria-label': 'Sets' }, ...chips);
}

function line(pen: CanvasRenderingContext2D, x1: number, y1: number, x2: number, y2: number, colour: string, width: number): void {
  pen.beginPath();
  pen.moveTo(x1, y1);
  pen.lineTo(x2, y2);
  pen.strokeStyle = colour;
  pen.lineWidth = width;
  pen.stroke();
}
