import './assets/fonts.css';
import './assets/tokens.css';
import './assets/base.css';
import './assets/book.css';
import './assets/sheet.css';
import { createPinia } from 'pinia';
import PrimeVue from 'primevue/config';
import { createApp } from 'vue';
import App from './App.vue';
import { Stillroom } from './assets/preset.ts';
import { contentNonce } from './composables/contentNonce.ts';
import { router } from './router/index.ts';

createApp(App)
  .use(createPinia())
  .use(router)
  .use(PrimeVue, {
    theme: { preset: Stillroom, options: { darkModeSelector: '.dark', cssLayer: false } },
    csp: { nonce: contentNonce },
  })
  .mount('#app');
