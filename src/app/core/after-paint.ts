/** A page that is not drawn (hidden meanwhile, say) holds nothing up for longer than this, ms. */
const AT_MOST = 100;

/**
 * Resolves when what was changed just now is on the screen: for work that may wait until a person has seen it. At once
 * where nothing is drawn.
 */
export function afterPaint(): Promise<void> {
  if (typeof requestAnimationFrame !== 'function' || document.visibilityState !== 'visible')
    return Promise.resolve();
  return new Promise((resolve) => {
    const timer = setTimeout(resolve, AT_MOST);
    requestAnimationFrame(() => {
      // The frame is drawn in the task that runs this; a message comes in the next one.
      const { port1, port2 } = new MessageChannel();
      port1.onmessage = () => {
        clearTimeout(timer);
        port1.close();
        resolve();
      };
      port2.postMessage(null);
    });
  });
}
