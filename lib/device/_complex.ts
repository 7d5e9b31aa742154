/** Complex arithmetic of admittances: plain pairs. */
export interface Complex {
  readonly re: number;
  readonly im: number;
}

export function complex(re: number, im: number): Complex {
  return { re, im };
}

export function add(a: Complex, b: Complex): Complex {
  return { re: a.re + b.re, im: a.im + b.im };
}

export function subtract(a: Complex, b: Complex): Complex {
  return { re: a.re - b.re, im: a.im - b.im };
}

export function multiply(a: Complex, b: Complex): Complex {
  return { re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re };
}

export function scale(a: Complex, factor: number): Complex {
  return { re: a.re * factor, im: a.im * factor };
}

/** 1/a, without overflow of the square of its size. */
export function reciprocal(a: Complex): Complex {
  const size = Math.hypot(a.re, a.im);
  return { re: a.re / size / size, im: -a.im / size / size };
}

export function divide(a: Complex, b: Complex): Complex {
  return multiply(a, reciprocal(b));
}

export function magnitude(a: Complex): number {
  return Math.hypot(a.re, a.im);
}
