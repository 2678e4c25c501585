import type { HeadState } from './heads';

/** Worst open thing at a head. `text` is the pennant's figure (`+9°`, `−6°`); diamonds carry their own sign. */
export interface HeadFlag {
  kind: 'over' | 'under' | 'lookAgain' | 'apart';
  text: string;
}

/** A small sheet hung on a head, centred at x, y. */
export interface MarkBox {
  x: number;
  y: number;
  width: number;
  height: number;
}

/** Pennant or diamond on the east side: over above, under below (look.md, "One slot each"). */
export interface FlagMark extends MarkBox {
  kind: HeadFlag['kind'];
  path: string;
  text: string;
  textY: number;
  /** Outlined instead of filled: the thing was accepted. */
  outlined: boolean;
}

/** Flag, tag and tally of one head. */
export interface HeadMarks {
  flag: FlagMark | null;
  tag: (MarkBox & { text: string }) | null;
  tally: (MarkBox & { done: boolean })[];
}

/** Places flag (east), tag (south-west) and the passes of a fastener that catches up (south-east). */
export function headMarks(state: HeadState, radius: number, small: boolean): HeadMarks {
  return {
    flag: state.flag ? flagMark(state.flag, radius, small, state.fill === 'accepted') : null,
    tag: state.tag ? tagMark(state.tag, radius, small) : null,
    tally: state.behind && !small ? tallyMarks(state.behind, radius) : [],
  };
}

function flagMark(flag: HeadFlag, radius: number, small: boolean, outlined: boolean): FlagMark {
  const text = small ? '' : flag.text;
  if (flag.kind === 'lookAgain' || flag.kind === 'apart') {
    const r = small ? 8 : 18;
    const place = { x: radius * 1.02, y: -radius * 0.95 };
    const path = `M0 ${-r}L${r} 0L0 ${r}L${-r} 0Z`;
    return { ...place, kind: flag.kind, path, width: 2 * r, height: 2 * r, text: '', textY: 7, outlined };
  }
  const width = small ? 14 : Math.max(46, flag.text.length * 9.4 + 18);
  const height = small ? 10 : 26;
  const [w, h, slope, peak] = [width / 2, height / 2, small ? 2 : 5, small ? 4 : 7];
  const up = flag.kind === 'over';
  const path = up
    ? `M${-w} ${h}V${-h + slope}L0 ${-h - peak}L${w} ${-h + slope}V${h}Z`
    : `M${-w} ${-h}V${h - slope}L0 ${h + peak}L${w} ${h - slope}V${-h}Z`;
  const y = radius * 1.02 * (up ? -1 : 1);
  return { x: radius * 0.95, y, kind: flag.kind, path, width, height, text, textY: up ? 8 : 5, outlined };
}

function tagMark(text: string, radius: number, small: boolean): MarkBox & { text: string } {
  const place = { x: -radius * 0.9, y: radius * 1.02 };
  return small
    ? { ...place, width: 9, height: 9, text: '' }
    : { ...place, width: text.length * 9.2 + 14, height: 24, text };
}

function tallyMarks(behind: { done: number; total: number }, radius: number): (MarkBox & { done: boolean })[] {
  return Array.from({ length: Math.min(8, behind.total) }, (_, i) => ({
    x: radius * 0.15 + i * 9 + 2.5,
    y: radius + 17,
    width: 5,
    height: 14,
    done: i < behind.done,
  }));
}
