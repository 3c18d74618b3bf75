/** The first digits of pi, 3 included, by J. Machin's formula in whole numbers (1706, memory). */
export function piDigits(count: number): readonly number[] {
  const guard = 10;
  const unit = 10n ** BigInt(count + guard);
  const pi = 4n * (4n * inverseTangent(5n, unit) - inverseTangent(239n, unit));
  return Array.from(String(pi).slice(0, count), Number);
}

function inverseTangent(x: bigint, unit: bigint): bigint {
  let power = unit / x;
  let sum = power;
  for (let odd = 3n; power !== 0n; odd += 2n) {
    power = -power / (x * x);
    sum += power / odd;
  }
  return sum;
}
