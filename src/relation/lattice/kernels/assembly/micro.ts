/**
 * Blocks of a matrix product held in registers: C = A·B, or C + A·B, for a block of C; the inner index runs upwards, one
 * multiplication and one addition per term. Arguments are bytes.
 */
export function micro4x4(c: usize, cs: usize, a: usize, as_: usize, b: usize, bs: usize, count: i32, accumulate: i32): void {
  let x00 = f64x2.splat(0);
  let x01 = f64x2.splat(0);
  let x10 = f64x2.splat(0);
  let x11 = f64x2.splat(0);
  let x20 = f64x2.splat(0);
  let x21 = f64x2.splat(0);
  let x30 = f64x2.splat(0);
  let x31 = f64x2.splat(0);
  if (accumulate) {
    x00 = v128.load(c, 0);
    x01 = v128.load(c, 16);
    x10 = v128.load(c + cs, 0);
    x11 = v128.load(c + cs, 16);
    x20 = v128.load(c + 2 * cs, 0);
    x21 = v128.load(c + 2 * cs, 16);
    x30 = v128.load(c + 3 * cs, 0);
    x31 = v128.load(c + 3 * cs, 16);
  }
  const d1 = as_;
  const d2 = as_ + as_;
  const d3 = d2 + as_;
  const stop = a + (<usize>count << 3);
  let d = a;
  while (d < stop) {
    const b0 = v128.load(b, 0);
    const b1 = v128.load(b, 16);
    const s0 = v128.load_splat<f64>(d);
    x00 = f64x2.add(x00, f64x2.mul(s0, b0));
    x01 = f64x2.add(x01, f64x2.mul(s0, b1));
    const s1 = v128.load_splat<f64>(d + d1);
    x10 = f64x2.add(x10, f64x2.mul(s1, b0));
    x11 = f64x2.add(x11, f64x2.mul(s1, b1));
    const s2 = v128.load_splat<f64>(d + d2);
    x20 = f64x2.add(x20, f64x2.mul(s2, b0));
    x21 = f64x2.add(x21, f64x2.mul(s2, b1));
    const s3 = v128.load_splat<f64>(d + d3);
    x30 = f64x2.add(x30, f64x2.mul(s3, b0));
    x31 = f64x2.add(x31, f64x2.mul(s3, b1));
    d += 8;
    b += bs;
  }
  v128.store(c, x00, 0);
  v128.store(c, x01, 16);
  v128.store(c + cs, x10, 0);
  v128.store(c + cs, x11, 16);
  v128.store(c + 2 * cs, x20, 0);
  v128.store(c + 2 * cs, x21, 16);
  v128.store(c + 3 * cs, x30, 0);
  v128.store(c + 3 * cs, x31, 16);
}

export function micro4x2(c: usize, cs: usize, a: usize, as_: usize, b: usize, bs: usize, count: i32, accumulate: i32): void {
  let x00 = f64x2.splat(0);
  let x10 = f64x2.splat(0);
  let x20 = f64x2.splat(0);
  let x30 = f64x2.splat(0);
  if (accumulate) {
    x00 = v128.load(c, 0);
    x10 = v128.load(c + cs, 0);
    x20 = v128.load(c + 2 * cs, 0);
    x30 = v128.load(c + 3 * cs, 0);
  }
  const d1 = as_;
  const d2 = as_ + as_;
  const d3 = d2 + as_;
  const stop = a + (<usize>count << 3);
  let d = a;
  while (d < stop) {
    const b0 = v128.load(b, 0);
    const s0 = v128.load_splat<f64>(d);
    x00 = f64x2.add(x00, f64x2.mul(s0, b0));
    const s1 = v128.load_splat<f64>(d + d1);
    x10 = f64x2.add(x10, f64x2.mul(s1, b0));
    const s2 = v128.load_splat<f64>(d + d2);
    x20 = f64x2.add(x20, f64x2.mul(s2, b0));
    const s3 = v128.load_splat<f64>(d + d3);
    x30 = f64x2.add(x30, f64x2.mul(s3, b0));
    d += 8;
    b += bs;
  }
  v128.store(c, x00, 0);
  v128.store(c + cs, x10, 0);
  v128.store(c + 2 * cs, x20, 0);
  v128.store(c + 3 * cs, x30, 0);
}

export function micro1x4(c: usize, a: usize, b: usize, bs: usize, count: i32, accumulate: i32): void {
  let x00 = f64x2.splat(0);
  let x01 = f64x2.splat(0);
  if (accumulate) {
    x00 = v128.load(c, 0);
    x01 = v128.load(c, 16);
  }
  const stop = a + (<usize>count << 3);
  let d = a;
  while (d < stop) {
    const b0 = v128.load(b, 0);
    const b1 = v128.load(b, 16);
    const s0 = v128.load_splat<f64>(d);
    x00 = f64x2.add(x00, f64x2.mul(s0, b0));
    x01 = f64x2.add(x01, f64x2.mul(s0, b1));
    d += 8;
    b += bs;
  }
  v128.store(c, x00, 0);
  v128.store(c, x01, 16);
}

export function micro1x2(c: usize, a: usize, b: usize, bs: usize, count: i32, accumulate: i32): void {
  let x00 = f64x2.splat(0);
  if (accumulate) {
    x00 = v128.load(c, 0);
  }
  const stop = a + (<usize>count << 3);
  let d = a;
  while (d < stop) {
    const b0 = v128.load(b, 0);
    const s0 = v128.load_splat<f64>(d);
    x00 = f64x2.add(x00, f64x2.mul(s0, b0));
    d += 8;
    b += bs;
  }
  v128.store(c, x00, 0);
}

/** One column of C = A·B for `rows` rows. */
export function scalarColumn(
  c: usize,
  cs: usize,
  a: usize,
  as_: usize,
  b: usize,
  bs: usize,
  rows: i32,
  count: i32,
): void {
  for (let i = 0; i < rows; i++) {
    let x: f64 = 0;
    let p = a;
    let q = b;
    for (let k = 0; k < count; k++) {
      x += f64.load(p) * f64.load(q);
      p += 8;
      q += bs;
    }
    f64.store(c, x);
    c += cs;
    a += as_;
  }
}
