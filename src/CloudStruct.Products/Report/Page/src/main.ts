// Puts the linked page together. Without it the report is still whole: its tables and pictures stand in the HTML.
import { cardView } from './card';
import { load } from './data';
import { Ledger } from './decisions';
import { el } from './dom';
import { filtersView } from './filters';
import { mapView } from './map';
import { netView } from './net';
import './page.css';
import { sceneView } from './scene';
import { sectionView } from './section';
import { Store } from './store';
import { strips } from './strip';
import { tablesView } from './tables';

async function start(): Promise<void> {
  const bench = document.getElementById('bench')!;
  const page = await load();
  const store = new Store(page);
  const ledger = new Ledger(store);
  const views = [page.cloud.count ? sceneView(store) : null, page.faces.length ? netView(store) : null, page.cloud.count ? mapView(store) : null, sectionView(store), cardView(store, ledger)];
  const parts = [el('h2', { id: 'bench-title' }, 'Look closer'), strips(store), filtersView(store), el('div', { class: 'views' }, ...views), tablesView(store), ledger.node];
  bench.replaceChildren(...parts.filter(p => p !== null));
  document.documentElement.classList.add('linked');
  // The strip is the spine: its rail stands right beneath it.
  const rail = bench.querySelector('.rail'), strip = document.querySelector('.strip:last-of-type');
  if (rail && strip) strip.after(rail);
  requestAnimationFrame(() => requestAnimationFrame(() => { bench.dataset['ready'] = String(Math.round(performance.now())); }));
}

start().catch((fault: unknown) => {
  const bench = document.getElementById('bench');
  bench?.replaceChildren(el('p', { class: 'nothing' }, `The linked views could not be opened (${String(fault)}). The tables and pictures below show the same.`));
});
