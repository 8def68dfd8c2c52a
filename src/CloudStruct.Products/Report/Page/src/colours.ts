// Okabe and Ito 2008, Color universal design: told apart with any colour vision. Each set also has a mark of its own shape, so a
// grey print loses nothing. The same numbers stand for the same sets in the program's plots.
const SETS: [number, number, number][] = [[0x00, 0x72, 0xb2], [0xd5, 0x5e, 0x00], [0x00, 0x9e, 0x73], [0xe6, 0x9f, 0x00], [0xcc, 0x79, 0xa7], [0x56, 0xb4, 0xe9], [0x30, 0x30, 0x30]];
const NO_SET: [number, number, number] = [0x80, 0x80, 0x80];
const ROCKS: Record<number, [number, number, number]> = {
  64: [0x56, 0xb4, 0xe9], 65: [0xd5, 0x5e, 0x00], 66: [0x00, 0x9e, 0x73], 67: [0xcc, 0x79, 0xa7], 68: [0xf0, 0xe4, 0x42],
};
export const ROCK_NAMES: Record<number, string> = { 64: 'host', 65: 'dike', 66: 'cover', 67: 'inclusion', 68: 'loose' };
export const CHOSEN = '#f0e442', INK = '#1a1a1a', QUIET = '#595959', HAIR = '#b5b0a6', MARGIN_A = '#0072b2', MARGIN_B = '#b34700';
export type Rgb = [number, number, number];

/** Hue by the set's number in its domain; darker in the dike, paler on contacts. */
export function ofSet(set: string): Rgb {
  const dash = set.lastIndexOf('-');
  if (dash < 0) return NO_SET;
  const base = SETS[(Number.parseInt(set.slice(dash + 1), 10) - 1) % SETS.length] ?? NO_SET, domain = set.slice(0, dash);
  const mix = (to: number, share: number) => base.map(c => Math.round(c * (1 - share) + to * share)) as Rgb;
  return domain === 'dike' ? mix(0, 0.45) : domain === 'margin' ? mix(255, 0.4) : base;
}

export function ofRock(code: number): Rgb {
  return ROCKS[code] ?? [176, 176, 176];
}

export function css([r, g, b]: Rgb, alpha = 1): string {
  return alpha === 1 ? `rgb(${r} ${g} ${b})` : `rgb(${r} ${g} ${b} / ${alpha})`;
}

/** Draws the mark of a set: circle, square, triangle, diamond, ... by its number. */
export function mark(pen: CanvasRenderingContext2D, set: string, x: number, y: number, r: number): void {
  const dash = set.lastIndexOf('-'), kind = dash < 0 ? 0 : (Number.parseInt(set.slice(dash + 1), 10) - 1) % 7;
  pen.beginPath();
  const path = (...corners: [number, number][]) => {
    corners.forEach(([dx, dy], i) => (i ? pen.lineTo(x + dx * r, y + dy * r) : pen.moveTo(x + dx * r, y + dy * r)));
    pen.closePath();
  };
  switch (kind) {
    case 0: pen.arc(x, y, r, 0, 2 * Math.PI); break;
    case 1: path([-0.88, -0.88], [0.88, -0.88], [0.88, 0.88], [-0.88, 0.88]); break;
    case 2: path([0, -1.15], [1.05, 0.8], [-1.05, 0.8]); break;
    case 3: path([0, -1.2], [1.2, 0], [0, 1.2], [-1.2, 0]); break;
    case 4: path([0, 1.15], [1.05, -0.8], [-1.05, -0.8]); break;
    case 5: path([0, -1.15], [1, -0.57], [1, 0.57], [0, 1.15], [-1, 0.57], [-1, -0.57]); break;
    default: path([-1.2, -0.42], [-0.42, -0.42], [-0.42, -1.2], [0.42, -1.2], [0.42, -0.42], [1.2, -0.42], [1.2, 0.42], [0.42, 0.42], [0.42, 1.2], [-0.42, 1.2], [-0.42, 0.42], [-1.2, 0.42]); break;
  }
}
