/** The part of mathjs that this folder uses; its own types cover the whole library only. */
interface MathjsUnit {
  /** Powers of mass, length, time, current, temperature, light, substance, angle, bit. */
  readonly dimensions: readonly number[];
  /** The one factor of a simple unit: SI value of the unit, and of its prefix. */
  readonly units: readonly [{
    readonly unit: { readonly name: string; readonly value: number };
    readonly prefix: { readonly name: string; readonly value: number };
  }];
}

declare const mathjs: {
  readonly Unit: {
    new (value: number, name: string): MathjsUnit;
    isValuelessUnit(name: string): boolean;
  };
};
export default mathjs;
