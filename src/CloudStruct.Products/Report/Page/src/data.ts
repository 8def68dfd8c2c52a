// What the program wrote into the page, unpacked.
export type Vec = [number, number, number];
export interface Column { name: string; meaning: string; text: boolean }
export interface Table { name: string; file: string; title: string; columns: Column[]; rows: string[][] }
export interface Dike { dike: number; aIsLower: boolean; toward: string; line: [number, number, number, number][]; normals: Vec[] }
export interface Trace { dike: number; margin: 'A' | 'B'; line: [number, number, number, number][] }
export interface Station { dike: number; station: number; chainage: number; place: Vec; a?: Vec; b?: Vec; lean?: number; width?: number }
export interface Contact { dike: number; margin: 'A' | 'B'; segment: number; from: number; to: number; middle: Vec; normal?: Vec }
export interface Curve { kind: string; group: string; level: number; points: [number, number][] }
export interface Net { name: string; sentence: string; groups: string[]; curves: Curve[] }
export interface Earlier {
  action: string; applied: boolean; found: string; faceId: number; place?: Vec; attitude?: [number, number]; other?: [number, number];
  north: string; domain: string; set: string; otherSet: string; dike: number; margin: string; note: string; by: string; on: string;
}
export interface Report {
  survey: string; run: string; version: string; north: 'true' | 'grid' | 'model'; turn: number; origin: Vec; colour: boolean;
  spacing: number; working: number; smallestFace: number; tables: Table[]; dikes: Dike[]; traces: Trace[]; stations: Station[]; contacts: Contact[];
  nets: Net[]; decisions: Earlier[];
  cloud?: { count: number; step: number; min: Vec; outlines: number[]; triangles: number[] };
}

export interface Face {
  index: number; id: number; domain: string; set: string; at: Vec; strike: number; dip: number; trend: number; plunge: number;
  cone: number; area: number; grade: string; decided: string; outline: Float32Array; triangles: Uint16Array; row: string[];
}

export interface Cloud { count: number; xyz: Float32Array; rgb: Uint8Array; rock: Uint8Array; face: Int32Array; low: Vec; high: Vec }
export interface Page { report: Report; faces: Face[]; cloud: Cloud; byId: Map<number, Face> }

export async function load(): Promise<Page> {
  const [text, planes] = await Promise.all([unpack('page-data'), unpack('page-cloud')]);
  const report = JSON.parse(new TextDecoder().decode(text)) as Report;
  const { cloud, outlines, triangles } = decode(report, planes);
  const faces = facesOf(report, outlines, triangles);
  return { report, faces, cloud, byId: new Map(faces.map(f => [f.id, f])) };
}

export function table(report: Report, name: string): Table {
  return report.tables.find(t => t.name === name)!;
}

/** Reads cells of one row by column name. */
export function reader(t: Table): (row: string[], column: string) => string {
  const at = new Map(t.columns.map((c, i) => [c.name, i]));
  return (row, column) => row[at.get(column) ?? -1] ?? '';
}

async function unpack(id: string): Promise<Uint8Array> {
  const text = atob(document.getElementById(id)!.textContent!.trim());
  if (text.length === 0) return new Uint8Array();
  const bytes = new Uint8Array(text.length);
  for (let i = 0; i < text.length; i++) bytes[i] = text.charCodeAt(i);
  // Written and read by hand: through a blob and a response the browser would pass megabytes in small pieces between processes.
  const unzip = new DecompressionStream('gzip'), writer = unzip.writable.getWriter(), out = unzip.readable.getReader();
  const fed = writer.write(bytes).then(() => writer.close());
  const pieces: Uint8Array[] = [];
  let length = 0;
  for (let piece = await out.read(); !piece.done; piece = await out.read()) {
    pieces.push(piece.value);
    length += piece.value.length;
  }
  await fed;
  const all = new Uint8Array(length);
  let at = 0;
  for (const piece of pieces) {
    all.set(piece, at);
    at += piece.length;
  }
  return all;
}

function decode(report: Report, planes: Uint8Array): { cloud: Cloud; outlines: Float32Array[]; triangles: Uint16Array[] } {
  const head = report.cloud;
  const empty: Vec = [0, 0, 0];
  if (!head) return { cloud: { count: 0, xyz: new Float32Array(), rgb: new Uint8Array(), rock: new Uint8Array(), face: new Int32Array(), low: empty, high: [1, 1, 1] }, outlines: [], triangles: [] };
  const n = head.count, xyz = new Float32Array(3 * n), rgb = new Uint8Array(3 * n), face = new Int32Array(n);
  let at = 0;
  const steps = (into: Float32Array, axis: number, count: number) => {
    let now = 0;
    for (let i = 0; i < count; i++) {
      now = (now + planes[at + i]! + (planes[at + count + i]! << 8)) & 0xffff;
      into[3 * i + axis] = now * head.step + head.min[axis]!;
    }
    at += 2 * count;
  };
  for (let axis = 0; axis < 3; axis++) steps(xyz, axis, n);
  for (let c = 0; c < 3; c++, at += n) for (let i = 0; i < n; i++) rgb[3 * i + c] = planes[at + i]!;
  const rock = planes.slice(at, at + n);
  at += n;
  for (let c = 0; c < 3; c++, at += n) for (let i = 0; i < n; i++) face[i]! |= planes[at + i]! << (8 * c);
  const total = head.outlines.reduce((a, b) => a + b, 0), all = new Float32Array(3 * total);
  for (let axis = 0; axis < 3; axis++) steps(all, axis, total);
  const outlines: Float32Array[] = [];
  let from = 0;
  for (const length of head.outlines) {
    outlines.push(all.subarray(3 * from, 3 * (from + length)));
    from += length;
  }
  const numbers = 3 * head.triangles.reduce((a, b) => a + b, 0), every = new Uint16Array(numbers), triangles: Uint16Array[] = [];
  for (let i = 0; i < numbers; i++) every[i] = planes[at + i]! | (planes[at + numbers + i]! << 8);
  from = 0;
  for (const n3 of head.triangles) {
    triangles.push(every.subarray(from, from + 3 * n3));
    from += 3 * n3;
  }
  const low: Vec = [Infinity, Infinity, Infinity], high: Vec = [-Infinity, -Infinity, -Infinity];
  for (let i = 0; i < 3 * n; i++) {
    const axis = i % 3, v = xyz[i]!;
    if (v < low[axis]!) low[axis] = v;
    if (v > high[axis]!) high[axis] = v;
  }
  return { cloud: { count: n, xyz, rgb, rock, face, low, high }, outlines, triangles };
}

function facesOf(report: Report, outlines: Float32Array[], triangles: Uint16Array[]): Face[] {
  const sheet = table(report, 'faces'), cell = reader(sheet), [ox, oy, oz] = report.origin;
  return sheet.rows.map((row, index) => {
    const n = (column: string) => Number.parseFloat(cell(row, column));
    return {
      index, id: n('face_id'), domain: cell(row, 'domain') || 'unknown', set: cell(row, 'set'), at: [n('x_m') - ox, n('y_m') - oy, n('z_m') - oz],
      strike: n('strike_deg'), dip: n('dip_deg'), trend: n('pole_trend_deg'), plunge: n('pole_plunge_deg'), cone: n('cone95_deg'), area: n('area_m2'),
      grade: cell(row, 'grade'), decided: cell(row, 'decided'), outline: outlines[index] ?? new Float32Array(), triangles: triangles[index] ?? new Uint16Array(), row,
    };
  });
}
