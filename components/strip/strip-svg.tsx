import { lanePaths, stripPaths } from "@/lib/core/strip-path";
import type { CellString } from "@/lib/views";

/** A strip that fills its box; the words stand beside it, so it is hidden from screen readers. */
export function StripSvg({ cells, height = 32, className = "" }: { cells: CellString; height?: number; className?: string }) {
  return (
    <svg className={`strip ${className}`} viewBox={`0 0 ${cells.length} ${height}`} preserveAspectRatio="none" aria-hidden="true" shapeRendering="crispEdges">
      {stripPaths(cells, { width: 1, height }).map((path) => <path key={path.cls} className={`cls-${path.cls}`} d={path.d} />)}
    </svg>
  );
}

export function LaneSvg({ counts, length, height = 16, className = "" }: { counts: readonly number[] | null; length: number; height?: number; className?: string }) {
  const { equal, differ } = lanePaths(counts, length, { width: 1, height });
  return (
    <svg className={`lane ${className}`} viewBox={`0 0 ${length} ${height}`} preserveAspectRatio="none" aria-hidden="true">
      <path className="lane-equal" d={equal} />
      <path className="lane-differ" d={differ} shapeRendering="crispEdges" />
    </svg>
  );
}
