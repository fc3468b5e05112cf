/** Complete elliptic integrals E and K of modulus k by the arithmetic-geometric mean (Abramowitz & Stegun 17.6). */
export function ellipticEK(modulus: number): { e: number; k: number } {
  let a = 1;
  let b = Math.sqrt(1 - modulus * modulus);
  let c = modulus;
  let sum = 0.5 * c * c;
  let power = 1;
  for (let i = 0; i < 40 && Math.abs(c) > 1e-17; i++) {
    const an = 0.5 * (a + b);
    c = 0.5 * (a - b);
    b = Math.sqrt(a * b);
    a = an;
    sum += power * c * c;
    power *= 2;
  }
  const k = Math.PI / (2 * a);
  return { k, e: k * (1 - sum) };
}
