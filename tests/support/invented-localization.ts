import type { LocalizationToSave } from "#lib/application/ports.ts";
import { NO_CHOICES } from "#lib/core/arrival/observation-choices.ts";

/** An answer of an event's first revision as its `number`th, with texts of the length that they have. */
export function inventedLocalization(eventId: string, number: number): LocalizationToSave {
  return {
    ...{ eventId, startedFrom: number - 1, eventRevision: 1, savedEpochSeconds: 1_700_000_000 + number, actor: "test", reason: `the ${number}th` },
    ...{ program: "offing test", nodeVersion: "v20", inputDigest: "ab".repeat(32), settingsJson: '{"sight":true}', choices: { ...NO_CHOICES, droppedReadingIds: [number] } },
    ...{ inputJson: `{"number":${number},"text":"${"input ".repeat(2000)}"}`, answerJson: `{"number":${number},"text":"${"answer ".repeat(4000)}"}`, outcome: "located" },
    source: { position: { latitudeDegrees: -47.5, longitudeDegrees: 170 }, originEpochSeconds: 1_699_000_000.5 },
  };
}
