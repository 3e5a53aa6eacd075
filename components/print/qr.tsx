import QRCode from "qrcode";

/** Modules of white around the code, as ISO/IEC 18004 asks. */
const QUIET = 4;

/** One rectangle for each run of dark modules in a row. */
function runs(dark: (row: number, column: number) => boolean, size: number): string {
  let path = "";
  for (let row = 0; row < size; row += 1) {
    for (let column = 0; column < size; column += 1) {
      if (!dark(row, column)) continue;
      let length = 1;
      while (column + length < size && dark(row, column + length)) length += 1;
      path += `M${column} ${row}h${length}v1h-${length}z`;
      column += length;
    }
  }
  return path;
}

/** A QR code with its white edge, drawn on the server: black on white in both themes and on paper. `size` is any CSS length. */
export function Qr({ text, size, label = `${text} as a square code` }: { text: string; size: number | string; label?: string }) {
  const { modules } = QRCode.create(text, { errorCorrectionLevel: "Q" });
  const whole = modules.size + 2 * QUIET;
  return (
    <svg viewBox={`${-QUIET} ${-QUIET} ${whole} ${whole}`} style={{ width: size, height: size }} className="block shrink-0" role="img" aria-label={label} shapeRendering="crispEdges" data-qr={text}>
      <path fill="#fff" d={`M${-QUIET} ${-QUIET}h${whole}v${whole}h-${whole}z`} style={{ printColorAdjust: "exact" }} />
      <path fill="#000" d={runs((row, column) => modules.get(row, column) === 1, modules.size)} style={{ printColorAdjust: "exact" }} />
    </svg>
  );
}
