import { onBeforeUnmount, onMounted, type Ref, ref } from 'vue';

/** How far ahead of the window things are made ready, in pixels. */
const ahead = '900px';

/** Work waiting for the page to be idle, so that scrolling later finds things ready. */
const waiting: (() => void)[] = [];
let asked = false;

function nextWhenIdle(): void {
  if (asked || waiting.length === 0) return;
  asked = true;
  requestIdleCallback(
    () => {
      asked = false;
      waiting.shift()?.();
      nextWhenIdle();
    },
    { timeout: 4000 },
  );
}

/**
 * Whether an element is or was near the window, or its turn came while the page was idle; never turns false again.
 * Printing needs everything at once.
 */
export function useInView(element: Ref<HTMLElement | null>): Readonly<Ref<boolean>> {
  const seen = ref(false);
  let observer: IntersectionObserver | null = null;

  function see(): void {
    seen.value = true;
    observer?.disconnect();
    observer = null;
    const at = waiting.indexOf(see);
    if (at >= 0) waiting.splice(at, 1);
  }

  onMounted(() => {
    if (element.value === null) return;
    observer = new IntersectionObserver(
      (entries) => {
        if (entries.some(({ isIntersecting }) => isIntersecting)) see();
      },
      { rootMargin: `${ahead} 0px` },
    );
    observer.observe(element.value);
    addEventListener('beforeprint', see);
    waiting.push(see);
    // The first view is to be interactive before anything else is made ready.
    setTimeout(nextWhenIdle, 1500);
  });
  onBeforeUnmount(() => {
    observer?.disconnect();
    removeEventListener('beforeprint', see);
    const at = waiting.indexOf(see);
    if (at >= 0) waiting.splice(at, 1);
  });
  return seen;
}
