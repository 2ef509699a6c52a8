import { describe, expect, test } from "vitest";
import { InputError } from "#lib/core/failures/input-error.ts";
import { readBuoySpectraText } from "#lib/records/buoy-spectra-text.ts";

// The layouts are those of the public buoy network's historical files: common practice, no source. The values are made up.
const OLD = `YY MM DD hh   .030   .040   .050
96 01 05 00    .01    .10    .69
96 01 05 01    .02  999.00   .57
`;
const NEW = `#YY  MM DD hh mm  .0325  .0375
#yr  mo dy hr mn  m^2/Hz m^2/Hz
2020 09 17 00 40   0.00   0.11
2020 09 17 01 40   1.25   0.25
`;

const at = (...moment: [number, number, number, number, number?]): number => Date.UTC(moment[0], moment[1] - 1, moment[2], moment[3], moment[4] ?? 0) / 1000;
const codes = (text: string): string[] => readBuoySpectraText(text, "w.txt").notes.map(({ code }) => code);

function problems(text: string): string[] {
  try {
    readBuoySpectraText(text, "w.txt");
  } catch (error) {
    if (error instanceof InputError) return error.issues.map(({ message }) => message);
    throw error;
  }
  throw new Error("The file was read.");
}

describe("the buoy network's text of spectra", () => {
  test("in its old layout: two-digit years, no minutes, 999 for what is missing", () => {
    const { value, notes } = readBuoySpectraText(OLD, "46042.txt");
    expect(value).toHaveLength(1);
    expect([...(value[0]?.frequenciesHz ?? [])]).toStrictEqual([0.03, 0.04, 0.05]);
    expect([...(value[0]?.epochSeconds ?? [])]).toStrictEqual([at(1996, 1, 5, 0), at(1996, 1, 5, 1)]);
    expect([...(value[0]?.densityMetresSquaredPerHz ?? [])]).toStrictEqual([0.01, 0.1, 0.69, 0.02, NaN, 0.57]);
    expect(notes).toStrictEqual([{ code: "missing-values", message: "46042.txt, line 3: with values that are missing." }]);
  });

  test("in its new layout: four-digit years, minutes, a line of units", () => {
    const { value, notes } = readBuoySpectraText(NEW, "w.txt");
    expect(notes).toStrictEqual([]);
    expect([...(value[0]?.epochSeconds ?? [])]).toStrictEqual([at(2020, 9, 17, 0, 40), at(2020, 9, 17, 1, 40)]);
    expect([...(value[0]?.densityMetresSquaredPerHz ?? [])]).toStrictEqual([0, 0.11, 1.25, 0.25]);
  });

  test("survives other line ends, a byte order mark, and blank lines", () => {
    const plain = readBuoySpectraText(NEW, "w.txt").value;
    for (const text of [`\uFEFF${NEW}`, NEW.replaceAll("\n", "\r\n"), NEW.replaceAll("\n", "\r"), `\n${NEW.replaceAll("\n", "\n\n")}`]) {
      expect(readBuoySpectraText(text, "w.txt").value).toStrictEqual(plain);
    }
  });

  test("puts rows in order, leaves out times said twice, and says so", () => {
    const text = `${OLD}96 01 04 23 1 2 3\n96 01 05 00 9 9 9\n`;
    const { value } = readBuoySpectraText(text, "w.txt");
    expect([...(value[0]?.epochSeconds ?? [])]).toStrictEqual([at(1996, 1, 4, 23), at(1996, 1, 5, 0), at(1996, 1, 5, 1)]);
    expect([...(value[0]?.densityMetresSquaredPerHz ?? [])].slice(3, 6)).toStrictEqual([0.01, 0.1, 0.69]);
    expect(codes(text)).toStrictEqual(["missing-values", "out-of-order", "repeated-times"]);
  });

  test("begins a new part where the bins change, and none where the same header stands again", () => {
    const { value, notes } = readBuoySpectraText(OLD + NEW + NEW.replaceAll("09 17", "09 18"), "w.txt");
    expect(value.map(({ epochSeconds }) => epochSeconds.length)).toStrictEqual([2, 4]);
    expect(notes[0]?.message).toBe("w.txt: its frequencies change; it was read as 2 parts.");
  });

  const faulty: [string, string, string][] = [
    ["too few values", "96 01 05 02 1 2", "row-width"],
    ["too many", "96 01 05 02 1 2 3 4", "row-width"],
    ["a day that is none", "96 02 30 02 1 2 3", "no-such-time"],
    ["an hour that is none", "96 01 05 24 1 2 3", "no-such-time"],
    ["the year 1900", "1900 01 05 02 1 2 3", "no-such-time"],
    ["the year 2300", "2300 01 05 02 1 2 3", "no-such-time"],
    ["text for a value", "96 01 05 02 1 x 3", "not-a-density"],
    ["a value below nothing", "96 01 05 02 1 -2 3", "not-a-density"],
    ["a value beyond all seas", "96 01 05 02 1 20000 3", "not-a-density"],
  ];
  test.each(faulty)("leaves out a row with %s, by its line, and goes on", (_, row, code) => {
    const { value, notes } = readBuoySpectraText(`${OLD}${row}\n96 01 05 03 1 2 3\n`, "w.txt");
    expect(value[0]?.epochSeconds).toHaveLength(3);
    expect(notes.find((note) => note.code === code)?.message).toMatch(/^w\.txt, line 4: left out, for /);
  });

  test("is refused where it has no header, one with text for frequencies, or nothing to use", () => {
    expect(problems("96 01 05 00 1 2 3")[0]).toMatch(/^w\.txt, row 1: found "96 01 05 00 1 2 3"; wanted a header YY MM DD hh/);
    expect(problems("YY MM DD hh one two\n96 01 05 00 1 2")[0]).toMatch(/^w\.txt, row 1: found "YY MM DD hh one two"; wanted YY MM DD hh/);
    expect(problems("YY MM DD hh .05 .04\n")[0]).toMatch(/frequencies in Hz that rise/);
    expect(problems("")).toStrictEqual(["w.txt: found nothing; wanted at least one row of spectra that can be used."]);
    expect(problems("YY MM DD hh .04\n96 02 30 00 1\n")).toHaveLength(1);
  });
});
