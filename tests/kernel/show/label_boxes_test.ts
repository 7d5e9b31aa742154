import { LabelBoxes, type LabelOffset } from "../../../kernel/show/_label_boxes.ts";
import { assert, assertEquals } from "../../assert.ts";

const RIGHT: LabelOffset = { dx: 10, dy: 0, anchor: "start" };
const LEFT: LabelOffset = { dx: -10, dy: 0, anchor: "end" };
const BELOW: LabelOffset = { dx: 0, dy: 20, anchor: "middle" };

Deno.test("LabelBoxes: takes the first offset while it is free, then the next", () => {
  const boxes = new LabelBoxes();
  const offsets = [RIGHT, LEFT, BELOW] as const;
  const at = { x: 300, y: 200, offsets };
  assertEquals([1, 2, 3].map(() => boxes.place("label", at)), [RIGHT, LEFT, BELOW]);
});

Deno.test("LabelBoxes: a text that would leave the map goes to the other side", () => {
  assertEquals(
    new LabelBoxes().place("a long label", { x: 570, y: 200, offsets: [RIGHT, LEFT] }),
    LEFT,
  );
});

Deno.test("LabelBoxes: where nothing is free the first offset is taken all the same", () => {
  const boxes = new LabelBoxes();
  boxes.take({ x1: 0, x2: 600, y1: 0, y2: 430 });
  assertEquals(boxes.place("label", { x: 300, y: 200, offsets: [LEFT, RIGHT] }), LEFT);
  assert(!boxes.isFree({ x1: 100, x2: 101, y1: 100, y2: 101 }));
});
