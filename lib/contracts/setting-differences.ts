export interface SettingDifference {
  /** Its address, such as `spread.timeHours`. */
  readonly name: string;
  readonly before: number | boolean | null;
  readonly after: number | boolean | null;
}

/** Settings whose values differ; null where one of the two does not know a setting. */
export function settingDifferences(before: object, after: object): SettingDifference[] {
  const [was, is] = [leaves(before), leaves(after)];
  const names = [...new Set([...was.keys(), ...is.keys()])];
  return names.filter((name) => was.get(name) !== is.get(name)).map((name) => ({ name, before: was.get(name) ?? null, after: is.get(name) ?? null }));
}

function leaves(settings: object, before = ""): Map<string, number | boolean> {
  const entries = Object.entries(settings) as [string, unknown][];
  return new Map(
    entries.flatMap(([name, value]): [string, number | boolean][] => {
      if (typeof value === "number" || typeof value === "boolean") return [[before + name, value]];
      return typeof value === "object" && value !== null ? [...leaves(value, `${before}${name}.`)] : [];
    }),
  );
}
