import { onBeforeUnmount, onMounted, type Ref, ref, type ShallowRef, shallowRef, watch } from 'vue';

/** Narrowest drawing, and what it keeps free of the width of its place, in pixels. */
const least = 280;
const margin = 6;
/** A place that becomes this much wider or narrower is drawn for anew, after a short rest. */
const worthDrawing = 12;
const rest = 250;

/**
 * A graph laid out for the width of its place on the page: again when what is drawn changes or the place does. Only the
 * layout asked for last is shown.
 *
 * @param layOut makes the layout for a width in pixels; the fonts of the page are there by then
 * @param sources what it draws: it is laid out anew when one of them changes
 * @param fits told the zoom at which all of its width is seen
 */
export function useDrawnInPlace<Graph extends { readonly width: number }>(
  layOut: (width: number) => Promise<Graph>,
  sources: readonly (() => unknown)[],
  fits: (zoom: number) => void,
): { readonly place: Ref<HTMLElement | null>; readonly graph: ShallowRef<Graph | null> } {
  const place = ref<HTMLElement | null>(null);
  const graph = shallowRef(null) as ShallowRef<Graph | null>;
  let asked = 0;
  let drawnFor = 0;
  let waiting: ReturnType<typeof setTimeout> | undefined;
  const room = () => (place.value?.clientWidth ?? 616) - margin;

  async function draw(): Promise<void> {
    const mine = (asked += 1);
    await document.fonts.ready;
    drawnFor = Math.max(least, room());
    const placed = await layOut(drawnFor);
    // A newer text may have been laid out meanwhile: the last one asked for is the one to show.
    if (mine !== asked) return;
    graph.value = placed;
    fits(Math.min(1, drawnFor / placed.width));
  }

  const watcher = new ResizeObserver(() => {
    if (drawnFor === 0 || Math.abs(Math.max(least, room()) - drawnFor) < worthDrawing) return;
    clearTimeout(waiting);
    waiting = setTimeout(() => void draw(), rest);
  });
  onMounted(() => {
    if (place.value !== null) watcher.observe(place.value);
    void draw();
  });
  onBeforeUnmount(() => {
    asked += 1;
    clearTimeout(waiting);
    watcher.disconnect();
  });
  watch([...sources], () => void draw());
  return { place, graph };
}
