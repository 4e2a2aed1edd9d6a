/**
 * Inverse of a symmetric positive definite matrix by Cholesky's factors, or null where it is not, to rounding: some row
 * is a combination of others.
 *
 * @param matrix Row by row, `size` × `size`; only its lower triangle is read.
 */
export function invertSymmetric(matrix: Float64Array, size: number): Float64Array | null {
  const factor = new Float64Array(size * size);
  for (let row = 0; row < size; row++) {
    for (let column = 0; column <= row; column++) {
      let sum = matrix[row * size + column]!;
      for (let inner = 0; inner < column; inner++) sum -= factor[row * size + inner]! * factor[column * size + inner]!;
      if (row === column) {
        if (!(sum > 1e-12 * matrix[row * size + row]!)) return null;
        factor[row * size + row] = Math.sqrt(sum);
      } else factor[row * size + column] = sum / factor[column * size + column]!;
    }
  }
  const inverse = new Float64Array(size * size);
  for (let unit = 0; unit < size; unit++) {
    const solution = new Float64Array(size);
    for (let row = 0; row < size; row++) {
      let sum = row === unit ? 1 : 0;
      for (let inner = 0; inner < row; inner++) sum -= factor[row * size + inner]! * solution[inner]!;
      solution[row] = sum / factor[row * size + row]!;
    }
    for (let row = size - 1; row >= 0; row--) {
      let sum = solution[row]!;
      for (let inner = row + 1; inner < size; inner++) sum -= factor[inner * size + row]! * solution[inner]!;
      solution[row] = sum / factor[row * size + row]!;
    }
    for (let row = 0; row < size; row++) inverse[row * size + unit] = solution[row]!;
  }
  return inverse;
}

/** A square matrix times a vector. */
export function multiply(matrix: Float64Array, vector: ArrayLike<number>): Float64Array {
  const size = vector.length;
  const product = new Float64Array(size);
  for (let row = 0; row < size; row++) {
    for (let column = 0; column < size; column++) product[row]! += matrix[row * size + column]! * vector[column]!;
  }
  return product;
}
