/** Resolves at the first signal that asks us to end; later ones are swallowed while we stop in order. */
export function stopSignal() {
  return new Promise((resolve) => {
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => resolve(signal));
  });
}
