import { computed, ref, watchEffect } from 'vue';

export type Theme = 'system' | 'light' | 'dark';

const key = 'stillroom.theme';
const kept = localStorage.getItem(key);
const theme = ref<Theme>(kept === 'light' || kept === 'dark' ? kept : 'system');
const system = matchMedia('(prefers-color-scheme: dark)');
const systemDark = ref(system.matches);
system.addEventListener('change', (event) => (systemDark.value = event.matches));

/** Whether the pages are dark now. */
const dark = computed(() => theme.value === 'dark' || (theme.value === 'system' && systemDark.value));

watchEffect(() => {
  document.documentElement.classList.toggle('dark', dark.value);
  if (theme.value === 'system') localStorage.removeItem(key);
  else localStorage.setItem(key, theme.value);
});

/** The theme chosen on this machine; `system` follows the machine's own. */
export const useTheme = () => ({ theme, dark });
