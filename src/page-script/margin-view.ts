import type { MapPanelRecord, MapRecord, PageData } from '../page/page-data.ts';
import { make } from './dom.ts';
import { choice } from './map-controls.ts';
import { mapView, type Tools, type View } from './map-view.ts';
import { profileView } from './profile-view.ts';

/** A condition's margin: a map, or a curve where it depends on one coordinate; of one functional at a time. */
export function marginView(host: HTMLElement, data: PageData, record: MapRecord, name: string, tools: Tools): View {
  const { panels } = record;
  const inner = make('div', { class: 'figure' });
  const show = (panel: MapPanelRecord): View => {
    delete inner.dataset.state;
    return (panel.variables.length > 1 ? mapView : profileView)(inner, data, record, panel, name, tools);
  };
  // The one with the deepest violation is the one to look at.
  const deepest = panels.reduce((best, panel, index) => {
    return (panel.margin ?? 0) < (panels[best]?.margin ?? 0) ? index : best;
  }, 0);
  let view = show(panels[deepest] as MapPanelRecord);
  const names = panels.map(
    ({ functional }, index) => [String(index), data.functionals[functional]?.name ?? ''] as const,
  );
  const chooser = choice('functional', `${name}-functional`, names, String(deepest), (value) => {
    view.end();
    view = show(panels[Number(value)] as MapPanelRecord);
    view.begin(0);
  });
  host.replaceChildren(...(panels.length > 1 ? [chooser] : []), inner);
  return { redraw: () => view.redraw(), begin: (rank) => view.begin(rank), end: () => view.end() };
}
