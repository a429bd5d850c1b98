import { onBeforeUnmount, onMounted, type Ref, ref } from 'vue';

/** Whether a media query holds, followed while the component stands. */
export function useMedia(query: string): Readonly<Ref<boolean>> {
  const list = matchMedia(query);
  const holds = ref(list.matches);
  const follow = () => (holds.value = list.matches);
  onMounted(() => list.addEventListener('change', follow));
  onBeforeUnmount(() => list.removeEventListener('change', follow));
  return holds;
}

/** Room for one page of the book at a time. */
export const useOnePage = () => useMedia('(max-width: 1099px)');

/** A phone: cell by cell. */
export const usePhone = () => useMedia('(max-width: 639px)');
