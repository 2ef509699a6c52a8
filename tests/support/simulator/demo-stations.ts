import type { Position } from "#lib/core/units/position.ts";

/** A station of the demo. The places are real sea; the names and all that is measured there are invented. */
export interface DemoStation {
  readonly id: string;
  readonly name: string;
  readonly position: Position;
  readonly depthMetres: number;
  readonly sensor: "surface" | "pressure" | "ground";
  readonly timeZone: string;
}

const station = (
  id: string,
  name: string,
  [latitudeDegrees, longitudeDegrees]: readonly [number, number],
  rest: Pick<DemoStation, "depthMetres" | "sensor" | "timeZone">,
): DemoStation => ({ id, name, position: { latitudeDegrees, longitudeDegrees }, ...rest });

export const DEMO_STATIONS: readonly DemoStation[] = [
  station("lan", "Lanternreach", [42.1, 146.9], { depthMetres: 900, sensor: "surface", timeZone: "Asia/Tokyo" }),
  station("ott", "Otterglass", [50.9, -174.2], { depthMetres: 1400, sensor: "surface", timeZone: "America/Adak" }),
  station("bra", "Brackenfoot", [57.3, -149.8], { depthMetres: 2100, sensor: "surface", timeZone: "America/Anchorage" }),
  station("tho", "Thornholm", [44.3, -125.6], { depthMetres: 1100, sensor: "surface", timeZone: "America/Los_Angeles" }),
  station("gul", "Gullmere", [28.6, -116.6], { depthMetres: 1800, sensor: "surface", timeZone: "America/Tijuana" }),
  station("wic", "Wickerstrand", [22.4, -159.4], { depthMetres: 700, sensor: "surface", timeZone: "Pacific/Honolulu" }),
  station("fen", "Fennbank", [-17.4, -150.2], { depthMetres: 1600, sensor: "surface", timeZone: "Pacific/Tahiti" }),
  station("sal", "Saltharrow", [-44.6, -175.6], { depthMetres: 1200, sensor: "surface", timeZone: "Pacific/Chatham" }),
  station("tar", "Tarnmouth", [-54.4, 158.4], { depthMetres: 2300, sensor: "surface", timeZone: "Antarctica/Macquarie" }),
  station("pal", "Palewater", [-34.2, 152.4], { depthMetres: 1500, sensor: "surface", timeZone: "Australia/Sydney" }),
  station("col", "Coldharrow", [-42.6, -74.4], { depthMetres: 0, sensor: "ground", timeZone: "America/Santiago" }),
  station("eve", "Evensound", [58.2, -9.4], { depthMetres: 1300, sensor: "surface", timeZone: "Europe/London" }),
  station("dri", "Driftholm", [43.9, -9.8], { depthMetres: 1900, sensor: "surface", timeZone: "Europe/Madrid" }),
  station("mar", "Marramness", [39.9, -31.5], { depthMetres: 1700, sensor: "surface", timeZone: "Atlantic/Azores" }),
  station("lar", "Larkstrand", [33.4, -66.2], { depthMetres: 1000, sensor: "surface", timeZone: "Atlantic/Bermuda" }),
  station("umb", "Umberbank", [17.6, -25.6], { depthMetres: 2600, sensor: "surface", timeZone: "Atlantic/Cape_Verde" }),
  station("red", "Redquill", [-4.2, -34.2], { depthMetres: 3100, sensor: "surface", timeZone: "America/Fortaleza" }),
];
