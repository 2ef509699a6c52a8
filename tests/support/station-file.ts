import type { StationDescription } from "#lib/core/arrival/station-description.ts";
import { writeStationRegister } from "#lib/records/write-station-register.ts";

const YEAR_SECONDS = 31_557_600;

/** So many invented stations of a network as large as any: two deployments each, an alias, and words about their data. */
export function inventedStations(count: number): StationDescription[] {
  return Array.from({ length: count }, (_, place): StationDescription => {
    const id = `st${String(place + 1).padStart(4, "0")}`;
    const position = { latitudeDegrees: -60 + ((place * 37) % 1200) / 10, longitudeDegrees: -180 + ((place * 91) % 3600) / 10 };
    const moved = 1_000_000_000 + (place % 10) * YEAR_SECONDS;
    const common = {
      stationId: id,
      name: `Station ${place + 1}`,
      depthMetres: 20 + (place % 80),
      sensor: "surface" as const,
      exposure: { facesFromDegrees: place % 180, facesToDegrees: 180 + (place % 180) },
      recordMinutes: 30,
      stamp: "start" as const,
      timeZone: "Pacific/Honolulu",
      shelf: [{ lengthMetres: 12_000, depthMetres: 40 }, { lengthMetres: 35_000, depthMetres: 90 }],
    };
    return {
      id,
      groupId: `group ${place % 12}`,
      aliases: [{ scheme: "wmo", value: String(40_000 + place) }],
      deployments: [
        { ...common, position, fromEpochSeconds: null, toEpochSeconds: moved },
        { ...common, position: { ...position, latitudeDegrees: position.latitudeDegrees + 0.01 }, fromEpochSeconds: moved, toEpochSeconds: null },
      ],
      clockCorrections: place % 20 === 0 ? [{ stationId: id, fromEpochSeconds: moved, toEpochSeconds: moved + 86_400, fastBySeconds: 3600, reason: "log kept in local time" }] : [],
      licence: "CC-BY-4.0",
      attribution: `Invented for this program, ${place}`,
      contact: "waves@example.org",
      doi: `10.1234/st.${place}`,
      visibility: "pool",
      embargoUntilEpochSeconds: null,
      note: "",
    };
  });
}

export function inventedStationFile(count: number): string {
  return writeStationRegister(inventedStations(count));
}
