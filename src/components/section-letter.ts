/** Letter of a result section by its place from 0: A … Z, then AA, AB …. */
export function sectionLetter(place: number): string {
  const last = String.fromCharCode(65 + (place % 26));
  return place < 26 ? last : sectionLetter(Math.floor(place / 26) - 1) + last;
}
