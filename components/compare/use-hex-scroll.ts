"use client";

import { type RefObject, useCallback, useLayoutEffect, useRef, useState } from "react";
import { flushSync } from "react-dom";
import { type Heights, type HexLayout, type HexRow, rowsBetween, topOf } from "./hex-layout";

/**
 * 64 MiB are 92 million px, browsers lay out about 16: a part of the rows stands in the scrolled box, and when its edge
 * comes near another part takes its place under the same lines.
 */
const PART_PX = 8_000_000;
const EDGE_PX = 400_000;
/** lines that are drawn beyond what is seen, and lines passed before others are drawn */
const BEYOND = 10;
const STEP = 6;
/** lines above the one that was gone to: the row they end in is seen whole */
const ABOVE = 1.5;
/** before the box was measured */
const GUESS: Heights = { line: 22, fold: 34, head: 29 };
const GUESS_PX = 620;

const remPx = (text: string) => Number.parseFloat(text) * Number.parseFloat(getComputedStyle(document.documentElement).fontSize);

/** The rows' heights as the style sheet has them for this layout and window. */
export function useHeights(boxRef: RefObject<HTMLElement | null>, layoutName: string): Heights {
  const [heights, setHeights] = useState<Heights>(GUESS);
  useLayoutEffect(() => {
    const element = boxRef.current;
    if (!element) return;
    const measure = () => {
      const style = getComputedStyle(element);
      const [line, fold, head] = ["line", "fold", "head"].map((name) => remPx(style.getPropertyValue(`--hex-${name}`)));
      if (line > 0 && fold > 0) setHeights((before) => (before.line === line && before.fold === fold && before.head === head ? before : { line, fold, head }));
    };
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    return () => observer.disconnect();
  }, [boxRef, layoutName]);
  return heights;
}

export interface HexScroll {
  rows: readonly HexRow[];
  /** px of the part in the box, and px above its first row drawn */
  partPx: number;
  abovePx: number;
  /** first address seen and the one behind the last */
  seen: { from: number; to: number };
  onScroll(): void;
  /** puts an address at the upper edge */
  show(at: number): void;
  /** of rows that fold or open next, those around this address stay where they are seen */
  keep(at: number): void;
}

/** An address that was gone to, a new object each time; `still` where it was only pointed at in the box. */
export interface Goal {
  at: number;
  still?: true;
}

/** The row at the upper edge once an address was gone to. */
function edgeFor(layout: HexLayout, at: number): { at: number; top: number } {
  const above = Math.max(0, topOf(layout, at) - ABOVE * layout.heights.line);
  return rowsBetween(layout, above, above + 1)[0] ?? { at: 0, top: 0 };
}

/** Which rows of a long layout are drawn. */
export function useHexScroll(boxRef: RefObject<HTMLElement | null>, layout: HexLayout, goal: Goal): HexScroll {
  const { heights, height } = layout;
  const step = STEP * heights.line;
  const [view, setView] = useState(() => ({ base: 0, top: edgeFor(layout, goal.at).top, high: GUESS_PX }));
  const base = useRef(0);
  /** px of rows that fit in the box: asked of the browser when it changes, not with every scroll */
  const fits = useRef(GUESS_PX);
  /** the address at the upper edge and how many px of its row are above it: kept when rows fold or change their height */
  const place = useRef({ at: goal.at, px: 0 });
  const gone = useRef<Goal | null>(null);

  const draw = useCallback((y: number, high: number) => {
    // on paper the box is as high as its rows: what was seen is what is printed
    if (window.matchMedia("print").matches) return;
    const next = { base: base.current, top: Math.floor(y / step) * step, high };
    setView((before) => (before.base === next.base && before.top === next.top && before.high === next.high ? before : next));
  }, [step]);

  /** the box to these px of the whole, in another part where this one ends too near */
  const moveTo = useCallback((px: number) => {
    const element = boxRef.current;
    if (!element) return;
    const high = element.clientHeight - heights.head;
    fits.current = high;
    const y = Math.min(Math.max(0, px), Math.max(0, height - high));
    const room = Math.max(0, height - PART_PX);
    const above = base.current === 0 || y - base.current > EDGE_PX;
    const below = base.current === room || base.current + PART_PX - y - high > EDGE_PX;
    if (base.current > room || !above || !below) base.current = Math.min(room, Math.max(0, Math.round(y - PART_PX / 2)));
    element.scrollTop = y - base.current;
    draw(y, high);
  }, [boxRef, height, heights.head, draw]);

  const settle = useCallback(() => moveTo(topOf(layout, place.current.at) + place.current.px), [layout, moveTo]);
  useLayoutEffect(() => {
    if (gone.current !== goal && !goal.still) place.current = { at: edgeFor(layout, goal.at).at, px: 0 };
    gone.current = goal;
    settle();
  }, [goal, layout, settle]);
  useLayoutEffect(() => {
    const element = boxRef.current;
    if (!element) return;
    const observer = new ResizeObserver(settle);
    observer.observe(element);
    return () => observer.disconnect();
  }, [boxRef, settle]);

  const onScroll = useCallback(() => {
    const element = boxRef.current;
    if (!element) return;
    const y = base.current + element.scrollTop;
    const [row] = rowsBetween(layout, y, y + 1);
    if (row) place.current = { at: row.at, px: y - row.top };
    const toEdge = Math.min(y - base.current, PART_PX - (y - base.current) - fits.current);
    // the other part must stand there before the box is painted again
    if (height > PART_PX && toEdge < EDGE_PX) flushSync(() => moveTo(y));
    else draw(y, fits.current);
  }, [boxRef, layout, height, moveTo, draw]);

  const show = useCallback((at: number) => {
    place.current = { at, px: 0 };
    settle();
  }, [settle]);

  const keep = useCallback((at: number) => {
    const element = boxRef.current;
    if (!element) return;
    const y = base.current + element.scrollTop;
    const top = topOf(layout, at);
    if (top >= y && top < y + fits.current) place.current = { at, px: y - top };
  }, [boxRef, layout]);

  const beyond = BEYOND * heights.line;
  const rows = rowsBetween(layout, view.top - beyond, view.top + step + view.high + beyond);
  const [first] = rowsBetween(layout, view.top, view.top + 1);
  const last = rowsBetween(layout, view.top + view.high - 1, view.top + view.high).at(-1) ?? rows.at(-1);
  return {
    rows, partPx: Math.min(PART_PX, height), abovePx: Math.max(0, (rows[0]?.top ?? 0) - view.base),
    seen: { from: first?.at ?? 0, to: last ? last.at + last.length : 0 }, onScroll, show, keep,
  };
}
