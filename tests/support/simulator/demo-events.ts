import type { Position } from "#lib/core/units/position.ts";

export interface DemoEvent {
  readonly id: string;
  readonly title: string;
  readonly note: string;
  readonly seed: number;
  readonly storm: Position;
  readonly originEpochSeconds: number;
  readonly ridge: readonly string[];
  readonly timed: readonly string[];
  /** Stations of which only the distance and the time are shared. */
  readonly estimated: readonly string[];
  readonly clock: { readonly station: string; readonly offsetSeconds: number } | null;
}

const utc = (year: number, month: number, day: number, hour: number): number => Date.UTC(year, month - 1, day, hour) / 1000;

export const DEMO_EVENTS: readonly DemoEvent[] = [
  {
    id: "petrel",
    title: "Winter storm seen around the North Pacific",
    note: "Six stations: four read from spectra, one timed by hand from the shore, one sharing only its estimate.",
    seed: 11,
    storm: { latitudeDegrees: 38.5, longitudeDegrees: 172 },
    originEpochSeconds: utc(2022, 1, 14, 6),
    ridge: ["lan", "ott", "bra", "tho"],
    timed: ["wic"],
    estimated: ["gul"],
    clock: null,
  },
  {
    id: "heron",
    title: "Two stations, and one crossing behind a continent",
    note: "The rings cross in the South Pacific and in the tropical Atlantic; land hides the second from both stations.",
    seed: 12,
    storm: { latitudeDegrees: -52, longitudeDegrees: -156 },
    originEpochSeconds: utc(2022, 6, 3, 15),
    ridge: ["col", "gul"],
    timed: [],
    estimated: [],
    clock: null,
  },
  {
    id: "tern",
    title: "Two stations, and nothing to choose between two crossings",
    note: "Both crossings lie in open water in sight of both stations: two possible sources.",
    seed: 13,
    storm: { latitudeDegrees: 38, longitudeDegrees: 175 },
    originEpochSeconds: utc(2022, 11, 21, 0),
    ridge: ["wic", "fen"],
    timed: [],
    estimated: [],
    clock: null,
  },
  {
    id: "albatross",
    title: "Far southern storm",
    note: "Rings cross the 180th meridian, and Tarnmouth's holds the South Pole. Coldharrow hears it in the ground.",
    seed: 14,
    storm: { latitudeDegrees: -60, longitudeDegrees: -121 },
    originEpochSeconds: utc(2022, 8, 9, 21),
    ridge: ["fen", "sal", "tar", "pal", "col"],
    timed: [],
    estimated: [],
    clock: null,
  },
  {
    id: "gannet",
    title: "A log that is a whole day out",
    note: "Six Atlantic stations; the clock of one of them is 24 hours fast.",
    seed: 15,
    storm: { latitudeDegrees: 53, longitudeDegrees: -40 },
    originEpochSeconds: utc(2022, 2, 18, 12),
    ridge: ["eve", "dri", "mar", "lar", "umb", "red"],
    timed: [],
    estimated: [],
    clock: { station: "umb", offsetSeconds: 86_400 },
  },
  {
    id: "fulmar",
    title: "One station alone",
    note: "A ring and a time, and no more than that.",
    seed: 16,
    storm: { latitudeDegrees: 54, longitudeDegrees: -44 },
    originEpochSeconds: utc(2022, 3, 27, 3),
    ridge: ["mar"],
    timed: [],
    estimated: [],
    clock: null,
  },
];
