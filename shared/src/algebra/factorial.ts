/** n! for the small integers of angular momentum theory; exact in double precision up to 22!. */
export function factorial(n: number): number {
  let product = 1;
  for (let k = 2; k <= n; k++) product *= k;
  return product;
}
