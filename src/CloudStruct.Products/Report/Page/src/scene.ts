// The outcrop in three dimensions: points, outlines of faces, contacts, the chosen face and station.
import {
  BufferAttribute, BufferGeometry, Color, DoubleSide, Group, LineBasicMaterial, LineDashedMaterial, LineLoop, LineSegments, Line, Mesh, MeshBasicMaterial,
  PerspectiveCamera, Points, PointsMaterial, Raycaster, SRGBColorSpace, Scene, Vector2, Vector3, WebGLRenderer,
} from 'three';
import { OrbitControls } from 'three/examples/jsm/controls/OrbitControls.js';
import { CHOSEN, MARGIN_A, MARGIN_B, ofRock, ofSet, type Rgb } from './colours';
import type { Face } from './data';
import { el } from './dom';
import { stationFrame } from './section';
import type { Store } from './store';

type Paint = 'photograph' | 'class' | 'set';

export function sceneView(store: Store): HTMLElement {
  const { cloud, faces, report } = store.page;
  const canvas = el('canvas', {
    id: 'scene', tabindex: '0', role: 'application', 'aria-roledescription': 'three-dimensional view', 'aria-describedby': 'scene-words',
    'aria-label': 'The outcrop in three dimensions. Arrow keys turn it, plus and minus change the distance.',
  });
  const words = el('p', { id: 'scene-words', class: 'caption' });
  const box = el('div', { class: 'canvas-box' }, canvas);
  let renderer: WebGLRenderer;
  try {
    renderer = new WebGLRenderer({ canvas, antialias: true });
  } catch {
    return el('section', { class: 'view scene', 'aria-labelledby': 'scene-title' },
      el('div', { class: 'head' }, el('h3', { id: 'scene-title' }, 'In three dimensions')),
      el('p', { class: 'nothing' }, 'This browser offers no WebGL, so the outcrop cannot be turned here; the pictures under Views show it.'));
  }
  renderer.setClearColor(0xfffefb);
  const scene = new Scene(), camera = new PerspectiveCamera(38, 1, 0.05, 5000);
  camera.up.set(0, 0, 1);
  const controls = new OrbitControls(camera, canvas);
  controls.enableDamping = false;
  controls.zoomToCursor = true;
  controls.listenToKeyEvents(canvas);
  controls.keys = { LEFT: '', UP: '', RIGHT: '', BOTTOM: '' };
  const middle = new Vector3(...cloud.low).add(new Vector3(...cloud.high)).multiplyScalar(0.5);
  const size = new Vector3(...cloud.high).sub(new Vector3(...cloud.low)).length();

  const geometry = new BufferGeometry();
  geometry.setAttribute('position', new BufferAttribute(cloud.xyz, 3));
  const colours = new Uint8Array(3 * cloud.count);
  geometry.setAttribute('color', new BufferAttribute(colours, 3, true));
  const points = new Points(geometry, new PointsMaterial({ size: 1.25 * report.spacing, vertexColors: true, sizeAttenuation: true }));
  points.frustumCulled = false;
  scene.add(points);

  // One mesh of all faces, for choosing; face of a triangle by its number.
  const sides = faces.reduce((n, f) => n + f.triangles.length / 3, 0), rims = faces.reduce((n, f) => n + f.outline.length / 3, 0);
  const corners = new Float32Array(9 * sides), owner = new Uint32Array(sides), edges = new Float32Array(6 * rims), edgeOwner = new Uint32Array(rims);
  let side = 0, edge = 0;
  for (const f of faces) {
    for (let i = 0; i < f.triangles.length; i += 3, side++) {
      for (let k = 0; k < 3; k++) for (let c = 0; c < 3; c++) corners[9 * side + 3 * k + c] = f.outline[3 * f.triangles[i + k]! + c]!;
      owner[side] = f.index;
    }
    for (let i = 0; i < f.outline.length; i += 3, edge++) {
      const next = (i + 3) % f.outline.length;
      for (let c = 0; c < 3; c++) {
        edges[6 * edge + c] = f.outline[i + c]!;
        edges[6 * edge + 3 + c] = f.outline[next + c]!;
      }
      edgeOwner[edge] = f.index;
    }
  }
  const fill = new Mesh(new BufferGeometry(), new MeshBasicMaterial({ side: DoubleSide, transparent: true, opacity: 0.26, vertexColors: true, depthWrite: false, polygonOffset: true, polygonOffsetFactor: -2, polygonOffsetUnits: -2 }));
  const outline = new LineSegments(new BufferGeometry(), new LineBasicMaterial({ vertexColors: true }));
  let shownTriangles: Uint32Array = new Uint32Array();
  scene.add(fill, outline);

  const contacts = new Group();
  for (const t of report.traces) {
    const g = new BufferGeometry().setFromPoints(t.line.map(p => new Vector3(p[0], p[1], p[2] + 0.01)));
    const l = new Line(g, t.margin === 'A' ? new LineBasicMaterial({ color: MARGIN_A }) : new LineDashedMaterial({ color: MARGIN_B, dashSize: 0.3, gapSize: 0.12 }));
    l.computeLineDistances();
    contacts.add(l);
  }
  scene.add(contacts);
  const chosen = new Group();
  scene.add(chosen);

  let paint: Paint = report.colour ? 'photograph' : 'class', asked = 0;
  const render = () => {
    if (asked) return;
    asked = requestAnimationFrame(() => {
      asked = 0;
      renderer.render(scene, camera);
    });
  };

  function repaint(): void {
    const set = faces.map(f => ofSet(f.set));
    for (let i = 0; i < cloud.count; i++) {
      let c: Rgb;
      if (paint === 'class') c = ofRock(cloud.rock[i]!);
      else if (paint === 'set') {
        const f = cloud.face[i]! - 1;
        c = f >= 0 && store.shown[f] ? (faces[f]!.set ? set[f]! : [228, 216, 176]) : [196, 193, 186];
      } else c = [cloud.rgb[3 * i]!, cloud.rgb[3 * i + 1]!, cloud.rgb[3 * i + 2]!];
      colours[3 * i] = c[0];
      colours[3 * i + 1] = c[1];
      colours[3 * i + 2] = c[2];
    }
    geometry.getAttribute('color').needsUpdate = true;
  }

  // A set that was chosen by itself stands out; the rest steps back.
  const marked = () => (store.choice.face < 0 ? store.choice.set : '');

  function rebuildFaces(): void {
    const only = marked();
    const colour = faces.map(f => new Color().setRGB(...((only && f.set !== only ? [206, 203, 196] : ofSet(f.set)).map(v => v / 255) as Rgb), SRGBColorSpace));
    shownTriangles = picked(owner);
    replace(fill, shownTriangles, corners, 9, owner, colour, 1);
    replace(outline, picked(edgeOwner), edges, 6, edgeOwner, colour, 0.7);
  }

  // Numbers of the triangles or edges whose face is shown.
  function picked(of: Uint32Array): Uint32Array {
    let n = 0;
    const all = new Uint32Array(of.length);
    of.forEach((f, i) => { if (store.shown[f]) all[n++] = i; });
    return all.subarray(0, n);
  }

  function markChosen(): void {
    chosen.clear();
    const f = store.face;
    if (f && f.outline.length) {
      const g = new BufferGeometry();
      g.setAttribute('position', new BufferAttribute(new Float32Array([...f.triangles].flatMap(i => at(f, i))), 3));
      const body = new Mesh(g, new MeshBasicMaterial({ color: CHOSEN, side: DoubleSide, transparent: true, opacity: 0.85, depthTest: false }));
      const rim = new LineLoop(new BufferGeometry().setFromPoints(Array.from({ length: f.outline.length / 3 }, (_, i) => new Vector3(...at(f, i)))), new LineBasicMaterial({ color: 0x1a1a1a, depthTest: false }));
      body.renderOrder = 5;
      rim.renderOrder = 6;
      chosen.add(body, rim);
    }
    const contact = report.contacts[store.choice.contact];
    if (contact) {
      const along = report.traces.filter(t => t.dike === contact.dike && t.margin === contact.margin).flatMap(t => t.line.filter(p => p[3] >= contact.from && p[3] <= contact.to));
      for (const [color, size] of [[0x1a1a1a, 9], [CHOSEN, 6]] as const) {
        const beads = new Points(new BufferGeometry().setFromPoints(along.map(p => new Vector3(p[0], p[1], p[2]))), new PointsMaterial({ color, size, sizeAttenuation: false, depthTest: false, transparent: true }));
        beads.renderOrder = size === 9 ? 7 : 8;
        chosen.add(beads);
      }
    }
    const s = stationFrame(store);
    if (s) {
      const { place, across, half } = s, up = 0.6 * half;
      const corner = (u: number, v: number) => new Vector3(place[0] + u * half * across[0], place[1] + u * half * across[1], place[2] + v * up);
      const frame = new LineLoop(new BufferGeometry().setFromPoints([corner(-1, -1), corner(1, -1), corner(1, 1), corner(-1, 1)]), new LineBasicMaterial({ color: 0x1a1a1a, depthTest: false, transparent: true }));
      frame.renderOrder = 4;
      chosen.add(frame);
    }
    canvas.dataset['face'] = String(f?.id ?? '');
    canvas.dataset['station'] = String(s?.station.station ?? '');
    words.textContent = `${cloud.count.toLocaleString('en-US')} points${cloud.count < report.working ? ` of ${report.working.toLocaleString('en-US')} in the working cloud` : ''}. `
      + `Yellow: the chosen face. Black frame: the chosen station. ${report.traces.length ? 'Contacts: A drawn through, B dashed.' : ''} Drag to turn, right-drag to move, wheel or + and − for the distance.`;
  }

  function look(from: 'front' | 'above' | 'along'): void {
    const dike = report.dikes.find(d => d.dike === store.choice.dike), far = size * 0.92;
    let way = new Vector3(0.35, -1, 0.55);
    if (dike && dike.line.length > 1) {
      const a = dike.line[0]!, b = dike.line.at(-1)!, along = new Vector3(b[0] - a[0], b[1] - a[1], 0).normalize();
      way = from === 'along' ? along.multiplyScalar(-1).setZ(0.35) : new Vector3(along.y, -along.x, 0.6);
    }
    if (from === 'above') way = new Vector3(0, -0.001, 1);
    controls.target.copy(middle);
    camera.position.copy(middle).addScaledVector(way.normalize(), far);
    camera.near = size / 2000;
    camera.far = size * 10;
    camera.updateProjectionMatrix();
    controls.update();
    render();
  }

  // The chosen thing comes to the middle; nothing spins, the direction of sight stays.
  function approach(target: Vector3, distance: number): void {
    const away = camera.position.clone().sub(controls.target), far = Math.min(away.length(), distance);
    controls.target.copy(target);
    camera.position.copy(target).addScaledVector(away.normalize(), far);
    controls.update();
  }

  function turn(azimuth: number, up: number): void {
    const off = camera.position.clone().sub(controls.target), r = off.length();
    const a = Math.atan2(off.y, off.x) + azimuth, e = Math.max(-1.5, Math.min(1.55, Math.asin(off.z / r) + up));
    camera.position.copy(controls.target).add(new Vector3(r * Math.cos(e) * Math.cos(a), r * Math.cos(e) * Math.sin(a), r * Math.sin(e)));
    controls.update();
  }

  canvas.addEventListener('keydown', e => {
    const away = camera.position.clone().sub(controls.target);
    switch (e.key) {
      case 'ArrowLeft': turn(-0.12, 0); break;
      case 'ArrowRight': turn(0.12, 0); break;
      case 'ArrowUp': turn(0, 0.1); break;
      case 'ArrowDown': turn(0, -0.1); break;
      case '+': case '=': camera.position.copy(controls.target).addScaledVector(away, 0.8); break;
      case '-': camera.position.copy(controls.target).addScaledVector(away, 1.25); break;
      case 'Escape': store.chooseFace(-1); break;
      default: return;
    }
    e.preventDefault();
    controls.update();
    render();
  });
  let down: [number, number] | undefined;
  canvas.addEventListener('pointerdown', e => { down = [e.clientX, e.clientY]; });
  canvas.addEventListener('pointerup', e => {
    if (!down || Math.hypot(e.clientX - down[0], e.clientY - down[1]) > 4) return;
    const r = canvas.getBoundingClientRect(), ray = new Raycaster();
    ray.setFromCamera(new Vector2(((e.clientX - r.left) / r.width) * 2 - 1, 1 - ((e.clientY - r.top) / r.height) * 2), camera);
    const hit = ray.intersectObject(fill)[0];
    store.chooseFace(hit?.faceIndex == null ? -1 : (owner[shownTriangles[hit.faceIndex] ?? 0] ?? -1));
  });
  controls.addEventListener('change', render);
  new ResizeObserver(() => {
    const { width, height } = box.getBoundingClientRect();
    if (width < 2 || height < 2) return;
    renderer.setPixelRatio(Math.min(window.devicePixelRatio || 1, 2));
    renderer.setSize(width, height, false);
    camera.aspect = width / height;
    camera.updateProjectionMatrix();
    render();
  }).observe(box);
  let lastFace = -1, lastSet = '', lastStation = store.choice.station;
  store.listen(change => {
    if (change !== 'choice' || marked() !== lastSet) {
      lastSet = marked();
      rebuildFaces();
      if (paint === 'set') repaint();
    }
    markChosen();
    const f = store.face;
    if (f && f.index !== lastFace) approach(new Vector3(...f.at), Math.max(6, 12 * Math.sqrt(f.area)));
    else if (store.choice.station !== lastStation && report.stations[store.choice.station]) approach(new Vector3(...report.stations[store.choice.station]!.place), size * 0.6);
    [lastFace, lastStation] = [store.choice.face, store.choice.station];
    render();
  });

  const colourBy = el('select', { id: 'scene-paint', 'aria-label': 'Colour of the points', change: () => { paint = colourBy.value as Paint; repaint(); render(); } });
  for (const [value, text] of [['photograph', 'photograph'], ['class', 'class'], ['set', 'set']] as const) {
    if (value === 'photograph' && !report.colour) continue;
    colourBy.append(el('option', { value }, text));
  }
  const toggle = (text: string, set: (on: boolean) => void) => {
    const input = el('input', { type: 'checkbox', checked: true, change: () => { set(input.checked); render(); } });
    return el('label', {}, input, ` ${text}`);
  };
  const button = (text: string, from: 'front' | 'above' | 'along') => el('button', { type: 'button', click: () => look(from) }, text);
  repaint();
  rebuildFaces();
  markChosen();
  look('front');
  return el('section', { class: 'view scene', 'aria-labelledby': 'scene-title' },
    el('div', { class: 'head' }, el('h3', { id: 'scene-title' }, 'In three dimensions'),
      el('span', { class: 'buttons' }, button('front', 'front'), button('above', 'above'), report.dikes.length ? button('along the dike', 'along') : null),
      el('label', {}, 'colour: ', colourBy), toggle('cloud', on => { points.visible = on; }),
      faces.length ? toggle('faces', on => { fill.visible = outline.visible = on; }) : null, report.traces.length ? toggle('contacts', on => { contacts.visible = on; }) : null),
    box, words);
}

function at(f: Face, i: number): [number, number, number] {
  return [f.outline[3 * i]!, f.outline[3 * i + 1]!, f.outline[3 * i + 2]!];
}

function replace(object: Mesh | LineSegments, parts: Uint32Array, from: Float32Array, size: number, owner: Uint32Array, colour: Color[], shade: number): void {
  const positions = new Float32Array(size * parts.length), colours = new Float32Array(size * parts.length);
  parts.forEach((part, i) => {
    const c = colour[owner[part]!]!;
    positions.set(from.subarray(size * part, size * (part + 1)), size * i);
    for (let k = size * i; k < size * (i + 1); k += 3) {
      colours[k] = c.r * shade;
      colours[k + 1] = c.g * shade;
      colours[k + 2] = c.b * shade;
    }
  });
  object.geometry.dispose();
  const g = new BufferGeometry();
  g.setAttribute('position', new BufferAttribute(positions, 3));
  g.setAttribute('color', new BufferAttribute(colours, 3));
  object.geometry = g;
}
