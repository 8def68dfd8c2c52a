// Small helpers for elements: text always goes in as text, so a survey's name cannot become markup.
export type Child = Node | string | null | undefined | false;

export function el<K extends keyof HTMLElementTagNameMap>(
  tag: K, attributes: Record<string, string | boolean | EventListener> = {}, ...children: Child[]
): HTMLElementTagNameMap[K] {
  const node = document.createElement(tag);
  for (const [name, value] of Object.entries(attributes)) {
    if (typeof value === 'function') node.addEventListener(name, value);
    else if (value === true) node.setAttribute(name, '');
    else if (value !== false) node.setAttribute(name, value);
  }
  for (const child of children) if (child) node.append(child);
  return node;
}

const SVG = 'http://www.w3.org/2000/svg';

export function svg(tag: string, attributes: Record<string, string | number>): SVGElement {
  const node = document.createElementNS(SVG, tag);
  for (const [name, value] of Object.entries(attributes)) node.setAttribute(name, String(value));
  return node;
}

/** A canvas that follows the size of its box, sharp on any screen. Calls back with its size in CSS pixels. */
export function fitted(canvas: HTMLCanvasElement, draw: (width: number, height: number) => void): () => void {
  const redraw = () => {
    const box = canvas.getBoundingClientRect();
    if (box.width < 2 || box.height < 2) return;
    const ratio = Math.min(window.devicePixelRatio || 1, 2);
    const width = Math.round(box.width * ratio), height = Math.round(box.height * ratio);
    if (canvas.width !== width || canvas.height !== height) [canvas.width, canvas.height] = [width, height];
    canvas.getContext('2d')!.setTransform(ratio, 0, 0, ratio, 0, 0);
    draw(box.width, box.height);
  };
  new ResizeObserver(redraw).observe(canvas);
  return redraw;
}

export function fixed(value: number, digits: number): string {
  return Number.isFinite(value) ? value.toFixed(digits) : '–';
}

export function count(n: number, one: string, many: string): string {
  return `${n.toLocaleString('en-US')} ${n === 1 ? one : many}`;
}

/** The largest of 1, 2, 5 times a power of ten that is not above a length. */
export function niceBelow(length: number): number {
  const power = 10 ** Math.floor(Math.log10(length)), part = length / power;
  return (part >= 5 ? 5 : part >= 2 ? 2 : 1) * power;
}
