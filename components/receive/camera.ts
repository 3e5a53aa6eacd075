/** What a browser offers for reading square codes; not every one does, and TypeScript does not know it yet. */
interface Detector {
  detect(source: CanvasImageSource): Promise<{ rawValue: string }[]>;
}
interface DetectorClass {
  new (options: { formats: string[] }): Detector;
  getSupportedFormats(): Promise<string[]>;
}

export const CANT_SCAN = "This browser can't scan. Type the number.";
const EVERY_MS = 180;

/** Whether the camera could be used, or a sentence that says why not. */
export async function openCamera(): Promise<{ stream: MediaStream; detector: Detector } | { sentence: string }> {
  const Class = (globalThis as { BarcodeDetector?: DetectorClass }).BarcodeDetector;
  if (!Class || !navigator.mediaDevices?.getUserMedia) return { sentence: CANT_SCAN };
  const formats = await Class.getSupportedFormats().catch((): string[] => []);
  if (!formats.includes("qr_code")) return { sentence: CANT_SCAN };
  try {
    const stream = await navigator.mediaDevices.getUserMedia({ audio: false, video: { facingMode: { ideal: "environment" } } });
    return { stream, detector: new Class({ formats: ["qr_code"] }) };
  } catch (error) {
    const name = error instanceof DOMException ? error.name : "";
    if (name === "NotAllowedError") return { sentence: "The camera was not allowed. Allow it in the browser's settings for this page, or type the number." };
    return { sentence: name === "NotFoundError" ? "No camera was found. Type the number." : "The camera does not start; another program may have it. Type the number." };
  }
}

/** Looks at the picture again and again until told to stop. Text of each code found goes to `found`. */
export function watch(video: HTMLVideoElement, detector: Detector, found: (text: string) => void): () => void {
  let stopped = false;
  const look = async () => {
    if (stopped) return;
    const codes = video.readyState >= 2 ? await detector.detect(video).catch(() => []) : [];
    if (stopped) return;
    if (codes.length > 0) found(codes[0].rawValue);
    setTimeout(() => void look(), EVERY_MS);
  };
  void look();
  return () => { stopped = true; };
}

export function closeCamera(stream: MediaStream): void {
  for (const track of stream.getTracks()) track.stop();
}
