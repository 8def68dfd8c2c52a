// The outcrop from above, made from the points of the page: dike, contacts, faces with strike and dip.
import { CHOSEN, INK, MARGIN_A, MARGIN_B, css, ofRock, ofSet } from './colours';
import { el, fitted, niceBelow } from './dom';
import type { Store } from './store';
import { stationFrame } from './section';

export function mapView(store: Store): HTMLElement {
  const { cloud, faces, report } = store.page;
  const canvas = el('canvas', {
    id: 'map', tabindex: '0', role: 'application', 'aria-roledescription': 'map', 'aria-describedby': 'map-words',
    'aria-label': 'Map of the outcrop. Arrow keys move it, plus and minus change its scale.',
  });
  const words = el('p', { id: 'map-words', class: 'caption' },
    `Grid north is up. Symbols: strike, with a tick down dip. ${report.turn ? `The arrow points to ${report.north === 'true' ? 'true' : 'grid'} north. ` : ''}The frame numbers are metres of the map grid.`);
  let scale = 0, mx = (cloud.low[0] + cloud.high[0]) / 2, my = (cloud.low[1] + cloud.high[1]) / 2, w = 1, h = 1;
  let ground: { canvas: HTMLCanvasElement; key: string } | undefined;
  // Low points first, so that what is seen from above is drawn last.
  let order: Uint32Array | undefined;
  const X = (x: number) => w / 2 + (x - mx) * scale, Y = (y: number) => h / 2 - (y - my) * scale;
  const fit = () => (scale = 0.94 * Math.min(w / Math.max(1, cloud.high[0] - cloud.low[0]), h / Math.max(1, cloud.high[1] - cloud.low[1])));

  const redraw = fitted(canvas, (width, height) => {
    [w, h] = [width, height];
    if (!scale) fit();
    const pen = canvas.getContext('2d')!;
    pen.fillStyle = '#fff';
    pen.fillRect(0, 0, w, h);
    pen.drawImage(raster(), 0, 0, w, h);
    grid(pen, false);
    for (const t of report.traces) polyline(pen, t.line, t.margin === 'A' ? MARGIN_A : MARGIN_B, 2.2, t.margin === 'B' ? [7, 3] : []);
    for (const d of report.dikes) polyline(pen, d.line, INK, 1, [2, 3]);
    symbols(pen);
    const contact = report.contacts[store.choice.contact];
    if (contact) for (const t of report.traces) {
      if (t.dike === contact.dike && t.margin === contact.margin) polyline(pen, t.line.filter(p => p[3] >= contact.from && p[3] <= contact.to), CHOSEN, 5, []);
    }
    station(pen);
    grid(pen, true);
    scaleBar(pen);
    if (report.north !== 'model') arrow(pen);
    canvas.dataset['face'] = String(store.face?.id ?? '');
    canvas.dataset['station'] = String(report.stations[store.choice.station]?.station ?? '');
  });

  function raster(): HTMLCanvasElement {
    const pw = Math.round(w), ph = Math.round(h), key = [pw, ph, scale, mx, my].join();
    if (ground?.key === key) return ground.canvas;
    order ??= byHeight(cloud.xyz, cloud.count);
    const at = document.createElement('canvas');
    [at.width, at.height] = [pw, ph];
    const pen = at.getContext('2d')!, image = pen.createImageData(pw, ph), px = new Uint32Array(image.data.buffer);
    // Squares wide enough to close the surface at this scale, centred on their point.
    const wide = Math.max(2, Math.min(9, Math.ceil(scale * report.spacing * 1.7))), half = wide / 2;
    for (const i of order) {
      const x = Math.round(X(cloud.xyz[3 * i]!) - half), y = Math.round(Y(cloud.xyz[3 * i + 1]!) - half);
      if (x <= -wide || y <= -wide || x >= pw || y >= ph) continue;
      const [r, g, b] = report.colour ? [cloud.rgb[3 * i]!, cloud.rgb[3 * i + 1]!, cloud.rgb[3 * i + 2]!] : ofRock(cloud.rock[i]!);
      // Paler than the photographs, so that lines and symbols stand out.
      const value = -0x1000000 | (pale(b) << 16) | (pale(g) << 8) | pale(r);
      const left = Math.max(0, x), right = Math.min(pw, x + wide), bottom = Math.min(ph, y + wide);
      for (let v = Math.max(0, y); v < bottom; v++) for (let u = left; u < right; u++) px[v * pw + u] = value;
    }
    pen.putImageData(image, 0, 0);
    ground = { canvas: at, key };
    return at;
  }

  function grid(pen: CanvasRenderingContext2D, figures: boolean): void {
    const step = niceBelow(110 / scale), [ox, oy] = report.origin;
    pen.font = '11px system-ui, sans-serif';
    pen.strokeStyle = 'rgb(26 26 26 / 0.22)';
    pen.lineWidth = 0.7;
    pen.textAlign = 'center';
    const label = (text: string, x: number, y: number) => {
      pen.lineWidth = 3;
      pen.strokeStyle = 'rgb(255 255 255 / 0.85)';
      pen.strokeText(text, x, y);
      pen.fillStyle = INK;
      pen.fillText(text, x, y);
      pen.strokeStyle = 'rgb(26 26 26 / 0.22)';
      pen.lineWidth = 0.7;
    };
    const digits = Math.max(0, -Math.floor(Math.log10(step)));
    for (let e = Math.ceil((mx - w / 2 / scale + ox) / step) * step; e < mx + w / 2 / scale + ox; e += step) {
      if (!figures) stroke(pen, X(e - ox), 0, X(e - ox), h);
      else if (X(e - ox) > 40 && X(e - ox) < w - 40) label(e.toFixed(digits), X(e - ox), h - 5);
    }
    for (let n = Math.ceil((my - h / 2 / scale + oy) / step) * step; n < my + h / 2 / scale + oy; n += step) {
      if (!figures) stroke(pen, 0, Y(n - oy), w, Y(n - oy));
      pen.textAlign = 'left';
      if (figures && Y(n - oy) > 60 && Y(n - oy) < h - 30) label(n.toFixed(digits), 4, Y(n - oy) + 4);
      pen.textAlign = 'center';
    }
  }

  function symbols(pen: CanvasRenderingContext2D): void {
    const chosen = store.face, only = chosen ? '' : store.choice.set;
    // As many as have room: larger faces first (they come by falling area), others as dots once the scale allows.
    const taken = new Set<string>();
    for (const f of only ? [...faces].sort((a, b) => Number(b.set === only) - Number(a.set === only)) : faces) {
      if (!store.shown[f.index] || f === chosen) continue;
      const x = X(f.at[0]), y = Y(f.at[1]);
      if (x < 0 || y < 0 || x > w || y > h) continue;
      const cell = `${Math.floor(x / 17)},${Math.floor(y / 17)}`;
      if (taken.has(cell)) continue;
      taken.add(cell);
      const back = only && f.set !== only;
      symbol(pen, x, y, f.strike - report.turn, f.dip, back ? '#a8a39a' : css(ofSet(f.set)), back ? 5 : 7, back ? 1 : 1.8);
    }
    if (!chosen) return;
    pen.beginPath();
    for (let i = 0; i < chosen.outline.length; i += 3) pen.lineTo(X(chosen.outline[i]!), Y(chosen.outline[i + 1]!));
    pen.closePath();
    pen.fillStyle = 'rgb(240 228 66 / 0.75)';
    pen.fill();
    pen.strokeStyle = INK;
    pen.lineWidth = 1.5;
    pen.stroke();
    const x = X(chosen.at[0]), y = Y(chosen.at[1]);
    pen.beginPath();
    pen.arc(x, y, 13, 0, 2 * Math.PI);
    pen.fillStyle = CHOSEN;
    pen.fill();
    pen.lineWidth = 2;
    pen.stroke();
    symbol(pen, x, y, chosen.strike - report.turn, chosen.dip, INK, 9, 2.4);
  }

  // As on the program's map sheet, after FGDC-STD-013-2006: a bar along strike with a tick down dip, to both sides for an upright
  // plane, and a cross in a circle for a level one.
  function symbol(pen: CanvasRenderingContext2D, x: number, y: number, strikeGrid: number, dip: number, colour: string, r: number, thick: number): void {
    const a = (strikeGrid * Math.PI) / 180, sx = Math.sin(a), sy = -Math.cos(a), dx = Math.cos(a), dy = Math.sin(a);
    for (const [style, width] of [['rgb(255 255 255 / 0.9)', thick + 2.2], [colour, thick]] as const) {
      pen.strokeStyle = style;
      pen.lineWidth = width;
      if (dip < 5) {
        stroke(pen, x - r * 0.7, y, x + r * 0.7, y);
        stroke(pen, x, y - r * 0.7, x, y + r * 0.7);
        pen.beginPath();
        pen.arc(x, y, r * 0.7, 0, 2 * Math.PI);
        pen.stroke();
        continue;
      }
      stroke(pen, x - r * sx, y - r * sy, x + r * sx, y + r * sy);
      const back = dip > 87 ? -0.6 : 0;
      stroke(pen, x + back * r * dx, y + back * r * dy, x + 0.6 * r * dx, y + 0.6 * r * dy);
    }
  }

  function station(pen: CanvasRenderingContext2D): void {
    const frame = stationFrame(store);
    if (!frame) return;
    const { place, across, half } = frame;
    pen.lineWidth = 5;
    pen.strokeStyle = '#fff';
    stroke(pen, X(place[0] - across[0] * half), Y(place[1] - across[1] * half), X(place[0] + across[0] * half), Y(place[1] + across[1] * half));
    pen.lineWidth = 2.4;
    pen.strokeStyle = INK;
    stroke(pen, X(place[0] - across[0] * half), Y(place[1] - across[1] * half), X(place[0] + across[0] * half), Y(place[1] + across[1] * half));
  }

  function polyline(pen: CanvasRenderingContext2D, points: readonly (readonly number[])[], colour: string, width: number, dash: number[]): void {
    for (const [style, thick] of [['rgb(255 255 255 / 0.8)', width + 2], [colour, width]] as const) {
      pen.beginPath();
      points.forEach((p, i) => (i ? pen.lineTo(X(p[0]!), Y(p[1]!)) : pen.moveTo(X(p[0]!), Y(p[1]!))));
      pen.setLineDash(style === colour ? dash : []);
      pen.strokeStyle = style;
      pen.lineWidth = thick;
      pen.stroke();
    }
    pen.setLineDash([]);
  }

  function scaleBar(pen: CanvasRenderingContext2D): void {
    const metres = niceBelow(w / 4 / scale), px = metres * scale;
    pen.fillStyle = 'rgb(255 255 255 / 0.9)';
    pen.fillRect(8, 8, px + 46, 28);
    pen.fillStyle = INK;
    pen.fillRect(14, 26, px, 4);
    pen.font = '12px system-ui, sans-serif';
    pen.textAlign = 'left';
    pen.fillText(`${metres >= 1 ? metres : metres.toFixed(1)} m`, 14, 21);
  }

  function arrow(pen: CanvasRenderingContext2D): void {
    pen.save();
    pen.translate(w - 26, 34);
    pen.fillStyle = 'rgb(255 255 255 / 0.9)';
    pen.beginPath();
    pen.arc(0, -2, 23, 0, 2 * Math.PI);
    pen.fill();
    pen.rotate((-report.turn * Math.PI) / 180);
    pen.fillStyle = INK;
    pen.beginPath();
    for (const [x, y] of [[0, -12], [6, 14], [0, 9], [-6, 14]] as const) pen.lineTo(x, y);
    pen.fill();
    pen.font = '600 11px system-ui, sans-serif';
    pen.textAlign = 'center';
    pen.fillText('N', 0, -14);
    pen.restore();
  }

  const zoom = (factor: number, x = w / 2, y = h / 2) => {
    const gx = mx + (x - w / 2) / scale, gy = my - (y - h / 2) / scale;
    scale = Math.min(2000, Math.max(0.02, scale * factor));
    [mx, my] = [gx - (x - w / 2) / scale, gy + (y - h / 2) / scale];
    redraw();
  };
  let drag: { x: number; y: number; far: boolean } | undefined;
  canvas.addEventListener('pointerdown', e => {
    drag = { x: e.clientX, y: e.clientY, far: false };
    canvas.setPointerCapture(e.pointerId);
  });
  canvas.addEventListener('pointermove', e => {
    if (!drag) return;
    const dx = e.clientX - drag.x, dy = e.clientY - drag.y;
    if (!drag.far && Math.hypot(dx, dy) < 4) return;
    drag = { x: e.clientX, y: e.clientY, far: true };
    [mx, my] = [mx - dx / scale, my + dy / scale];
    redraw();
  });
  canvas.addEventListener('pointerup', e => {
    if (drag && !drag.far) {
      let best = -1, least = 14;
      for (const f of faces) {
        const off = store.shown[f.index] ? Math.hypot(X(f.at[0]) - e.offsetX, Y(f.at[1]) - e.offsetY) : Infinity;
        if (off < least) [best, least] = [f.index, off];
      }
      store.chooseFace(best);
    }
    drag = undefined;
  });
  canvas.addEventListener('keydown', e => {
    const step = 40 / scale;
    switch (e.key) {
      case '+': case '=': zoom(1.4); break;
      case '-': zoom(1 / 1.4); break;
      case 'ArrowLeft': mx -= step; break;
      case 'ArrowRight': mx += step; break;
      case 'ArrowUp': my += step; break;
      case 'ArrowDown': my -= step; break;
      case 'Escape': store.chooseFace(-1); break;
      default: return;
    }
    e.preventDefault();
    redraw();
  });
  store.listen(() => {
    const f = store.face;
    if (f && (X(f.at[0]) < 20 || X(f.at[0]) > w - 20 || Y(f.at[1]) < 20 || Y(f.at[1]) > h - 20)) [mx, my] = [f.at[0], f.at[1]];
    redraw();
  });
  const button = (text: string, label: string, act: () => void) => el('button', { type: 'button', 'aria-label': label, click: act }, text);
  return el('section', { class: 'view map', 'aria-labelledby': 'map-title' },
    el('div', { class: 'head' }, el('h3', { id: 'map-title' }, 'Map'),
      el('span', { class: 'buttons' }, button('+', '+ larger scale', () => zoom(1.5)), button('−', '− smaller scale', () => zoom(1 / 1.5)),
        button('all', 'Show all of the map', () => { [mx, my] = [(cloud.low[0] + cloud.high[0]) / 2, (cloud.low[1] + cloud.high[1]) / 2]; fit(); redraw(); }))),
    canvas, words);
}

function pale(c: number): number {
  return Math.round(c + (255 - c) * 0.38);
}

function stroke(pen: CanvasRenderingContext2D, x1: number, y1: number, x2: number, y2: number): void {
  pen.beginPath();
  pen.moveTo(x1, y1);
  pen.lineTo(x2, y2);
  pen.stroke();
}

// By 1024 layers of height: as good as sorting for a picture, and in one pass.
function byHeight(xyz: Float32Array, n: number): Uint32Array {
  let low = Infinity, high = -Infinity;
  for (let i = 2; i < 3 * n; i += 3) {
    low = Math.min(low, xyz[i]!);
    high = Math.max(high, xyz[i]!);
  }
  const layers = 1024, starts = new Uint32Array(layers + 1), layer = (i: number) => Math.min(layers - 1, Math.floor(((xyz[3 * i + 2]! - low) / (high - low || 1)) * layers));
  for (let i = 0; i < n; i++) starts[layer(i) + 1]!++;
  for (let l = 0; l < layers; l++) starts[l + 1]! += starts[l]!;
  const order = new Uint32Array(n);
  for (let i = 0; i < n; i++) order[starts[layer(i)]!++] = i;
  return order;
}
