/** Runs of neighbouring points for which `isInside` holds, as bands from the first to the last wavelength of each. */
export function bandsOf(wavelengthNm: Float64Array, isInside: readonly boolean[]): [number, number][] {
  const bands: [number, number][] = []
  isInside.forEach((inside, i) => {
    if (!inside) return
    if (i > 0 && isInside[i - 1]) bands.at(-1)![1] = wavelengthNm[i]!
    else bands.push([wavelengthNm[i]!, wavelengthNm[i]!])
  })
  return bands
}
