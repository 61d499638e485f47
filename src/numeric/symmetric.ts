/**
 * Solves A x = b for a symmetric positive definite matrix by Cholesky factorisation.
 *
 * Error: relative about the condition number times 1e-16. The matrix is overwritten by its factor.
 *
 * @param A rows of the matrix, n by n; only the lower triangle is read
 * @param b right side; overwritten by the solution
 * @returns false when the matrix is not positive definite, and b then holds nothing of use
 */
export function solveSymmetric(A: readonly Float64Array[], b: Float64Array): boolean {
  const n = b.length
  for (let i = 0; i < n; i++) {
    const row = A[i]!
    for (let j = 0; j <= i; j++) {
      const other = A[j]!
      let sum = row[j]!
      for (let k = 0; k < j; k++) sum -= row[k]! * other[k]!
      if (i === j) {
        if (!(sum > 0)) return false
        row[i] = Math.sqrt(sum)
      } else row[j] = sum / other[j]!
    }
  }
  for (let i = 0; i < n; i++) {
    let sum = b[i]!
    for (let k = 0; k < i; k++) sum -= A[i]![k]! * b[k]!
    b[i] = sum / A[i]![i]!
  }
  for (let i = n - 1; i >= 0; i--) {
    let sum = b[i]!
    for (let k = i + 1; k < n; k++) sum -= A[k]![i]! * b[k]!
    b[i] = sum / A[i]![i]!
  }
  return true
}
