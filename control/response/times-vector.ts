/** m v into `product`, four rows at a time; each sum runs in order of the columns. Rows are taken from the length of `product`. */
export function timesVector(m: Float64Array, v: Float64Array, columns: number, product: Float64Array): void {
  const rows = product.length;
  let i = 0;
  for (; i + 4 <= rows; i += 4) {
    let a = i * columns;
    let b = a + columns;
    let c = b + columns;
    let d = c + columns;
    let [sumA, sumB, sumC, sumD] = [0, 0, 0, 0];
    for (let k = 0; k < columns; k++) {
      const entry = v[k];
      sumA += m[a++] * entry;
      sumB += m[b++] * entry;
      sumC += m[c++] * entry;
      sumD += m[d++] * entry;
    }
    product[i] = sumA;
    product[i + 1] = sumB;
    product[i + 2] = sumC;
    product[i + 3] = sumD;
  }
  for (; i < rows; i++) {
    let sum = 0;
    for (let k = 0, at = i * columns; k < columns; k++, at++) sum += m[at] * v[k];
    product[i] = sum;
  }
}
