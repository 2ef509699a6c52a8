"use client";

import dynamic from "next/dynamic";
import type { EventChoice } from "./keep-part.tsx";
import styles from "./hand-readings.module.css";
import type { StationChoice } from "./station-choice.ts";

// What was typed earlier lies on this device, where the server cannot see it: the form is made there.
const Form = dynamic(() => import("./hand-readings.tsx").then((module) => module.HandReadings), {
  ssr: false,
  loading: () => <p role="status" className={styles.loading}>Loading the form…</p>,
});

export function LoadedOnDevice(props: { stations: readonly StationChoice[]; events: readonly EventChoice[] }) {
  return <Form {...props} />;
}
