/** The point is moved in the text: a product with 1000 would miss the length by its last binary digit now and then. */
export function metresOf(kilometres: number): number {
  return shifted(kilometres, 3);
}

export function kilometresOf(metres: number): number {
  return shifted(metres, -3);
}

function shifted(value: number, digits: number): number {
  const [mantissa = "", power = "0"] = String(value).split("e");
  return Number(`${mantissa}e${Number(power) + digits}`);
}
