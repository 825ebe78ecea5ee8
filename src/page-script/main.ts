import type { MapRecord, PageData } from '../page/page-data.ts';
import { find } from './dom.ts';
import type { View } from './map-view.ts';
import { marginView } from './margin-view.ts';
import { plotsView } from './plots-view.ts';
import { verdictTable } from './verdict-table.ts';
import { openOffice, serveWork } from './work.ts';

if (typeof document === 'undefined') serveWork(self as unknown as Parameters<typeof serveWork>[0]);
else openPage();

function openPage(): void {
  const data = JSON.parse(find(document, '#page-data').textContent ?? '') as PageData;
  const live = find<HTMLElement>(document, '#live');
  const announce = (text: string) => {
    live.textContent = text;
  };
  const sources = ['#kernels', '#script'].map((id) => find(document, id).textContent ?? '');
  const office = openOffice(sources, data.kernels);
  const scheme = matchMedia('(prefers-color-scheme: dark)');
  let isPrinting = false;
  const tools = { office, announce, isDark: () => scheme.matches && !isPrinting };

  const table = document.querySelector<HTMLElement>('#verdicts');
  if (table !== null) verdictTable(table, announce);

  const views = new Map<HTMLElement, View>();
  for (const host of document.querySelectorAll<HTMLElement>('[data-map]')) {
    const index = Number(host.dataset.map);
    views.set(host, marginView(host, data, data.maps[index] as MapRecord, `map-${index}`, tools));
  }
  const plots = document.querySelector<HTMLElement>('#plots');
  const curves = plots === null ? undefined : plotsView(plots, data, announce);
  const redrawAll = () => {
    for (const view of views.values()) view.redraw();
    curves?.redraw();
  };

  // What is looked at first, then what stands open, in its order, so that it is there when the page is printed.
  const watch = new IntersectionObserver((entries) => {
    for (const { target, isIntersecting } of entries) if (isIntersecting) views.get(target as HTMLElement)?.begin(2);
  });
  [...views].forEach(([host, view], index) => {
    watch.observe(host);
    if (host.closest('details:not([open])') === null) view.begin(10 + index);
  });

  let laidOut = 0;
  new ResizeObserver(() => {
    if (document.documentElement.clientWidth === laidOut) return;
    laidOut = document.documentElement.clientWidth;
    redrawAll();
  }).observe(document.documentElement);
  scheme.addEventListener('change', redrawAll);
  const details = [...document.querySelectorAll<HTMLDetailsElement>('details')];
  for (const one of details) {
    one.addEventListener('toggle', () => {
      for (const [host, view] of views) if (one.contains(host)) view.redraw();
    });
  }

  // Printed are the conditions that stand open, and all formulas and sheets.
  const always = details.filter(({ classList }) => classList.contains('sheet') || classList.contains('source'));
  let closed: readonly HTMLDetailsElement[] = [];
  addEventListener('beforeprint', () => {
    isPrinting = true;
    closed = always.filter(({ open }) => !open);
    for (const one of closed) one.open = true;
    redrawAll();
  });
  addEventListener('afterprint', () => {
    isPrinting = false;
    for (const one of closed) one.open = false;
    redrawAll();
  });

  const openTarget = () => {
    if (location.hash === '') return;
    const target = document.getElementById(decodeURIComponent(location.hash.slice(1)));
    for (let at = target; at !== null; at = at.parentElement) if (at instanceof HTMLDetailsElement) at.open = true;
    target?.scrollIntoView();
  };
  addEventListener('hashchange', openTarget);
  openTarget();
  document.documentElement.dataset.ready = 'yes';
}
