import { FRAME } from "./_chart_frame.ts";
import { FONT_SIZE } from "./_draw_svg.ts";
import { MAP } from "./_map_frame.ts";

/** Width of one character [px], on average, of a drawing's bold text. */
const CHARACTER = FONT_SIZE * 0.62;
/** Half the height of a line of text [px]. */
const HALF_LINE = 8;

/** Where a text may stand, relative to its point [px]. */
export interface LabelOffset {
  readonly dx: number;
  readonly dy: number;
  readonly anchor: "start" | "middle" | "end";
}

/** A rectangle on the page [px]. */
export interface Box {
  readonly x1: number;
  readonly x2: number;
  readonly y1: number;
  readonly y2: number;
}

/** Texts placed on a map so that none covers another. */
export class LabelBoxes {
  readonly #taken: Box[] = [];

  /** Keeps others away from a rectangle. */
  take(box: Box): void {
    this.#taken.push(box);
  }

  /** Whether a rectangle lies inside the map and covers nothing. */
  isFree(box: Box): boolean {
    return box.x1 >= FRAME.left && box.x2 <= FRAME.width - FRAME.right && box.y1 >= MAP.top &&
      box.y2 <= MAP.height - FRAME.bottom &&
      this.#taken.every((other) =>
        box.x1 > other.x2 || box.x2 < other.x1 || box.y1 > other.y2 || box.y2 < other.y1
      );
  }

  /** Takes the first of the offsets at which a text is free, or the first of all. */
  place(
    text: string,
    { x, y, offsets }: {
      readonly x: number;
      readonly y: number;
      readonly offsets: readonly [LabelOffset, ...LabelOffset[]];
    },
  ): LabelOffset {
    const box = ({ dx, dy, anchor }: LabelOffset): Box => {
      const width = [...text].length * CHARACTER;
      const left = x + dx - { start: 0, middle: width / 2, end: width }[anchor];
      return {
        x1: left,
        x2: left + width,
        y1: y + dy - HALF_LINE,
        y2: y + dy + HALF_LINE,
      };
    };
    const found = offsets.find((offset) => this.isFree(box(offset))) ?? offsets[0];
    this.take(box(found));
    return found;
  }
}
