/**
 * The nonce that the server put into this page: styles made at run time (PrimeVue, the editors) must carry it.
 */
export const contentNonce = document.querySelector<HTMLMetaElement>('meta[name="csp-nonce"]')?.content ?? '';
