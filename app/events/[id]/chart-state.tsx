import styles from "./event-sheet.module.css";

/** What keeps the chart from showing the answer to this choice of stations; nothing where it does. */
export function ChartState({ isDrawn, isWorking, isBehind, failure }: { isDrawn: boolean; isWorking: boolean; isBehind: boolean; failure: string | null }) {
  if (failure !== null) {
    return (
      <p className={styles.state} role="alert">
        {isDrawn
          ? `This choice could not be worked out: ${failure} The chart still shows the last answer.`
          : `The chart could not be drawn: ${failure} The figures beside it ${isBehind ? "are those of what was kept" : "stand"}; loading the page again may help.`}
      </p>
    );
  }
  if (isDrawn && !isWorking) return null;
  return (
    <p className={`${styles.state ?? ""} ${isDrawn ? (styles.late ?? "") : ""}`} role="status">
      {isDrawn ? "Working out this choice…" : "Drawing the chart…"}
    </p>
  );
}
