import { type Payload, PAYLOAD_MIME } from "./payload.ts";

/** A display message's data by MIME type; `text/plain` stands alone where nothing else is shown. */
export interface MimeBundle {
  /** What stands alone. */
  readonly "text/plain": string;
  /** Any richer form. */
  readonly [mime: string]: unknown;
}

/** The method under which the kernel looks for a value's own bundle. */
const JUPYTER_DISPLAY: unique symbol = Symbol.for("Jupyter.display") as never;

/** A thing that `show` displays; as the last value of a cell it displays itself. */
export class Showable {
  /**
   * Makes a showable of a bundle.
   *
   * @param bundle what is displayed
   */
  constructor(readonly bundle: MimeBundle) {}

  /** The bundle's plain text. */
  toString(): string {
    return this.bundle["text/plain"];
  }

  /** What the kernel displays when the value ends a cell. */
  [JUPYTER_DISPLAY](): MimeBundle {
    return this.bundle;
  }
}

/** A showable that also hands data to the report. */
export class PayloadShowable<P extends Payload> extends Showable {
  /**
   * Makes a showable that carries `payload` in its bundle.
   *
   * @param payload what the report collects
   * @param bundle how people see it
   */
  constructor(readonly payload: P, bundle: MimeBundle) {
    super({ ...bundle, [PAYLOAD_MIME]: payload });
  }
}
