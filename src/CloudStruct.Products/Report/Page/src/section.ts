// The cross-section at a station: points within a thin slice, both contacts, the width between them.
import { INK, MARGIN_A, MARGIN_B, QUIET, ROCK_NAMES, css, ofRock } from './colours';
import { el, fitted, niceBelow } from './dom';
import type { Station, Vec } from './data';
import { reader, table } from './data';
import type { Store } from './store';

export interface StationFrame { station: Station; place: Vec; across: [number, number]; half: number }

/** The chosen station with the level direction from A to B; half is half of what the section shows [m]. */
export function stationFrame(store: Store): StationFrame | undefined {
  const { report } = store.page, s = report.stations[store.choice.station];
  if (!s) return undefined;
  const dike = report.dikes.find(d => d.dike === s.dike);
  let across: [number, number] = [1, 0];
  if (dike && dike.line.length > 0) {
    let nearest = 0;
    dike.line.forEach((p, i) => { if (Math.abs(p[3] - s.chainage) < Math.abs(dike.line[nearest]![3] - s.chainage)) nearest = i; });
    const n = dike.normals[nearest]!, level = Math.hypot(n[0], n[1]);
    if (level > 0.05) across = [n[0] / level, n[1] / level];
  }
  const width = s.width ?? (s.a && s.b ? Math.hypot(s.a[0] - s.b[0], s.a[1] - s.b[1]) : 2);
  return { station: s, place: s.place, across, half: Math.max(2, 1.6 * width + 1) };
}

export function sectionView(store: Store): HTMLElement {
  const { cloud, report } = store.page;
  if (report.stations.length === 0) {
    return el('section', { class: 'view section', 'aria-labelledby': 'section-title' },
      el('div', { class: 'head' }, el('h3', { id: 'section-title' }, 'Cross-section')),
      el('p', { class: 'nothing' }, 'There is no station along a dike here, so no cross-section can be laid.'));
  }

  const canvas = el('canvas', { id: 'section', role: 'img', 'aria-describedby': 'section-words' });
  const words = el('p', { id: 'section-words', class: 'caption', 'aria-live': 'polite' });
  const sheet = table(report, 'stations'), cell = reader(sheet);
  const redraw = fitted(canvas, (w, h) => {
    const pen = canvas.getContext('2d')!;
    pen.fillStyle = '#fff';
    pen.fillRect(0, 0, w, h);
    const frame = stationFrame(store);
    if (!frame) return;
    const { station, place, across, half } = frame, along = [-across[1], across[0]] as const;
    // Half a slice: thick enough for a line of points, thin enough to be one place.
    const slice = Math.max(0.04, 1.2 * report.spacing);
    const scale = Math.min(w / (2 * half), h / (1.7 * half)), zero = h * 0.55;
    const X = (u: number) => w / 2 + u * scale, Y = (z: number) => zero - (z - place[2]) * scale;
    let seen = 0;
    for (let i = 0; i < cloud.count; i++) {
      const dx = cloud.xyz[3 * i]! - place[0], dy = cloud.xyz[3 * i + 1]! - place[1];
      if (Math.abs(dx * along[0] + dy * along[1]) > slice) continue;
      const u = dx * across[0] + dy * across[1], y = Y(cloud.xyz[3 * i + 2]!);
      if (Math.abs(u) > half || y < 0 || y > h) continue;
      pen.fillStyle = css(ofRock(cloud.rock[i]!));
      pen.fillRect(X(u) - 1.2, y - 1.2, 2.4, 2.4);
      seen++;
    }
    axes(pen, w, h, scale, X);
    margin(pen, station.a, MARGIN_A, 'A', []);
    margin(pen, station.b, MARGIN_B, 'B', [8, 4]);
    const row = sheet.rows[store.choice.station]!, width = cell(row, 'true_width_m');
    if (station.a && station.b && width) widthBar(pen);
    canvas.dataset['station'] = String(station.station);
    const limits = cell(row, 'true_width_low95_m') ? ` (95 %: ${cell(row, 'true_width_low95_m')} to ${cell(row, 'true_width_high95_m')} m)` : '';
    words.textContent = `Dike ${station.dike}, station ${station.station}, chainage ${cell(row, 'chainage_m')} m: `
      + (width ? `true width ${width} m${limits}. ` : `${cell(row, 'status').replaceAll('_', ' ')}${cell(row, 'visible_width_m') ? `, at least ${cell(row, 'visible_width_m')} m` : ''}. `)
      + `Looking along increasing chainage; ${seen.toLocaleString('en-US')} points within ${(slice * 100).toFixed(0)} cm of the section, coloured by class.`;
    canvas.setAttribute('aria-label', words.textContent);

    function margin(p: CanvasRenderingContext2D, at: Vec | undefined, colour: string, name: string, dash: number[]): void {
      if (!at) return;
      const u = (at[0] - place[0]) * across[0] + (at[1] - place[1]) * across[1], lean = station.lean;
      p.strokeStyle = colour;
      p.fillStyle = colour;
      if (lean !== undefined) {
        const run = Math.tan((Math.max(-85, Math.min(85, lean)) * Math.PI) / 180), up = 0.8 * half;
        p.lineWidth = 2.2;
        p.setLineDash(dash);
        p.beginPath();
        p.moveTo(X(u - run * up), Y(at[2] - up));
        p.lineTo(X(u + run * up), Y(at[2] + up));
        p.stroke();
        p.setLineDash([]);
      }
      p.beginPath();
      p.arc(X(u), Y(at[2]), 4.5, 0, 2 * Math.PI);
      p.fill();
      p.strokeStyle = '#fff';
      p.lineWidth = 1.5;
      p.stroke();
      p.font = '600 14px system-ui, sans-serif';
      p.textAlign = 'center';
      halo(p, name, X(u) + (name === 'A' ? -14 : 14), Y(at[2]) - 8, colour);
    }

    function widthBar(p: CanvasRenderingContext2D): void {
      const lean = ((station.lean ?? 0) * Math.PI) / 180, value = Number(width), c = Math.cos(lean), s = Math.sin(lean);
      const ua = (station.a![0] - place[0]) * across[0] + (station.a![1] - place[1]) * across[1];
      const y0 = station.a![2] + 0.55 * half, x0 = ua + Math.tan(lean) * 0.55 * half;
      p.strokeStyle = INK;
      p.lineWidth = 1.6;
      p.beginPath();
      p.moveTo(X(x0), Y(y0));
      p.lineTo(X(x0 + value * c), Y(y0 - value * s));
      p.stroke();
      p.font = '13px system-ui, sans-serif';
      p.textAlign = 'center';
      halo(p, `${Number(width).toFixed(2)} m`, X(x0 + (value * c) / 2), Y(y0 - (value * s) / 2) - 7, INK);
    }
  });

  function axes(pen: CanvasRenderingContext2D, w: number, h: number, scale: number, X: (u: number) => number): void {
    const step = niceBelow(80 / scale), px = step * scale;
    pen.fillStyle = INK;
    pen.fillRect(10, h - 14, px, 3);
    pen.font = '12px system-ui, sans-serif';
    pen.textAlign = 'left';
    halo(pen, `${step} m, no exaggeration`, 10, h - 20, INK);
    pen.textAlign = 'left';
    halo(pen, '← A side', 8, 18, QUIET);
    pen.textAlign = 'right';
    halo(pen, 'B side →', w - 8, 18, QUIET);
    pen.strokeStyle = 'rgb(26 26 26 / 0.15)';
    pen.lineWidth = 1;
    pen.beginPath();
    pen.moveTo(X(0), 0);
    pen.lineTo(X(0), h);
    pen.stroke();
  }

  store.listen(redraw);
  const there = new Set(cloud.rock), key = el('span', { class: 'rocks' });
  for (const [code, name] of Object.entries(ROCK_NAMES)) {
    if (there.has(Number(code))) key.append(el('span', {}, el('i', { style: `background: ${css(ofRock(Number(code)))}`, 'aria-hidden': 'true' }), ` ${name}`));
  }
  return el('section', { class: 'view section', 'aria-labelledby': 'section-title' },
    el('div', { class: 'head' }, el('h3', { id: 'section-title' }, 'Cross-section'), key), canvas, words);
}

function halo(pen: CanvasRenderingContext2D, text: string, x: number, y: number, colour: string): void {
  pen.lineWidth = 3.5;
  pen.strokeStyle = 'rgb(255 255 255 / 0.9)';
  pen.strokeText(text, x, y);
  pen.fillStyle = colour;
  pen.fillText(text, x, y);
}
