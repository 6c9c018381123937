/** A square code as the browser's own reader finds it; not in the DOM library yet. */
interface FoundCode {
  readonly rawValue: string;
}
interface BarcodeReader {
  detect(source: HTMLVideoElement): Promise<readonly FoundCode[]>;
}
type BarcodeReaderClass = new (options: { formats: string[] }) => BarcodeReader;

function readerClass(): BarcodeReaderClass | null {
  const found: unknown = Reflect.get(globalThis, 'BarcodeDetector');
  return typeof found === 'function' ? (found as BarcodeReaderClass) : null;
}

/** Whether this browser can read labels by its camera. */
export function readsLabels(): boolean {
  return readerClass() !== null && 'mediaDevices' in navigator;
}

/** The loom's number in what a label says: the application's address `/l/<number>`, or the number alone. Null: neither. */
export function numberOnLabel(text: string): number | null {
  const found = /(?:\/l\/|^)(\d{1,6})\/?(?:[?#].*)?$/.exec(text.trim());
  return found ? Number(found[1]) : null;
}

const PAUSE = 200;

/**
 * Shows the camera in a video and looks for a label until one is found or `signal` is aborted. Throws where the camera
 * is refused or there is none.
 */
export async function readLabel(video: HTMLVideoElement, signal: AbortSignal): Promise<number | null> {
  const Reader = readerClass();
  if (!Reader) return null;
  const stream = await navigator.mediaDevices.getUserMedia({ video: { facingMode: 'environment' } });
  try {
    video.srcObject = stream;
    await video.play();
    const reader = new Reader({ formats: ['qr_code'] });
    while (!signal.aborted) {
      for (const { rawValue } of await reader.detect(video)) {
        const number = numberOnLabel(rawValue);
        if (number !== null) return number;
      }
      await new Promise((resolve) => setTimeout(resolve, PAUSE));
    }
    return null;
  } finally {
    for (const track of stream.getTracks()) track.stop();
    video.srcObject = null;
  }
}
