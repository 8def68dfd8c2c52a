// The one place that knows what is chosen and what is shown; every view asks it and is told of changes.
import type { Face, Page } from './data';
import { table } from './data';

export interface Choice { face: number; set: string; contact: number; station: number; dike: number }
export interface Filters { domains: Set<string>; set: string; grades: Set<string>; areaM2: number }
export type Change = 'choice' | 'filters' | 'decisions';

export class Store {
  readonly choice: Choice = { face: -1, set: '', contact: -1, station: -1, dike: 0 };
  readonly filters: Filters;
  readonly shown: Uint8Array;
  readonly dropped = new Set<number>();
  readonly sets: string[];
  private readonly listeners: ((change: Change) => void)[] = [];

  constructor(readonly page: Page) {
    const { faces, report } = page;
    this.sets = table(report, 'sets').rows.map(r => r[0]!).filter((s, i, all) => all.indexOf(s) === i);
    this.filters = { domains: new Set(this.domains), set: '', grades: new Set(this.grades), areaM2: 0 };
    this.shown = new Uint8Array(faces.length).fill(1);
    this.choice.dike = report.dikes[0]?.dike ?? report.stations[0]?.dike ?? 0;
    this.choice.station = this.firstStation(this.choice.dike);
  }

  get domains(): string[] {
    return ['host', 'dike', 'margin', 'unknown'].filter(d => this.page.faces.some(f => f.domain === d));
  }

  get grades(): string[] {
    return ['firm', 'fair', 'weak'].filter(g => this.page.faces.some(f => f.grade === g));
  }

  get face(): Face | undefined {
    return this.page.faces[this.choice.face];
  }

  get shownFaces(): Face[] {
    return this.page.faces.filter(f => this.shown[f.index]);
  }

  listen(listener: (change: Change) => void): void {
    this.listeners.push(listener);
  }

  tell(change: Change): void {
    if (change !== 'choice') this.refresh();
    for (const listener of this.listeners) listener(change);
  }

  chooseFace(index: number): void {
    const face = this.page.faces[index];
    Object.assign(this.choice, { face: face ? index : -1, set: face?.set ?? '', contact: -1 });
    if (face) this.near(face.at);
    this.tell('choice');
  }

  chooseSet(set: string): void {
    Object.assign(this.choice, { set, face: -1, contact: -1 });
    this.tell('choice');
  }

  chooseContact(index: number): void {
    const c = this.page.report.contacts[index];
    if (!c) return;
    Object.assign(this.choice, { contact: index, face: -1, set: '' });
    this.chooseChainage(c.dike, (c.from + c.to) / 2);
  }

  chooseStation(index: number): void {
    const s = this.page.report.stations[index];
    if (!s) return;
    Object.assign(this.choice, { station: index, dike: s.dike });
    this.tell('choice');
  }

  chooseChainage(dike: number, chainage: number): void {
    let best = -1, least = Infinity;
    this.page.report.stations.forEach((s, i) => {
      const off = Math.abs(s.chainage - chainage);
      if (s.dike === dike && off < least) [best, least] = [i, off];
    });
    this.choice.dike = dike;
    if (best >= 0) this.choice.station = best;
    this.tell('choice');
  }

  // A face beside the dike also says where along it we are; one that is far off moves nothing.
  private near(at: readonly number[]): void {
    let best = -1, least = Infinity;
    this.page.report.stations.forEach((s, i) => {
      const off = Math.hypot(s.place[0] - at[0]!, s.place[1] - at[1]!, s.place[2] - at[2]!);
      if (off < least) [best, least] = [i, off];
    });
    if (best >= 0) Object.assign(this.choice, { station: best, dike: this.page.report.stations[best]!.dike });
  }

  private firstStation(dike: number): number {
    const all = this.page.report.stations;
    const first = all.findIndex(s => s.dike === dike && s.width !== undefined);
    return first >= 0 ? first : all.findIndex(s => s.dike === dike);
  }

  private refresh(): void {
    const { domains, set, grades, areaM2 } = this.filters;
    for (const f of this.page.faces) {
      const pass = domains.has(f.domain) && grades.has(f.grade) && f.area >= areaM2 && (set === '' || (set === 'none' ? f.set === '' : f.set === set));
      this.shown[f.index] = pass && !this.dropped.has(f.id) ? 1 : 0;
    }
  }
}

export function words(f: Face): string {
  const compass = ['N', 'NNE', 'NE', 'ENE', 'E', 'ESE', 'SE', 'SSE', 'S', 'SSW', 'SW', 'WSW', 'W', 'WNW', 'NW', 'NNW'];
  const toward = compass[Math.round((((f.strike + 90) % 360) / 22.5)) % 16];
  return f.dip < 5 ? `dip ${f.dip.toFixed(0)}°, too flat for a strike` : `strike ${String(Math.round(f.strike) % 360).padStart(3, '0')}°, dip ${f.dip.toFixed(0)}° ${toward}`;
}
