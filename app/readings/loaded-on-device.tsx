"use client";

import dynamic from "next/dynamic";
import { useEffect, useState } from "react";
import { openShelf, type DraftShelf } from "../_components/draft-shelf.ts";
import type { EventChoice } from "./keep-part.tsx";
import styles from "./hand-readings.module.css";
import type { StationChoice } from "./station-choice.ts";

const Form = dynamic(() => import("./hand-readings.tsx").then((module) => module.HandReadings), { ssr: false, loading: () => <Loading /> });

/** What was typed earlier lies on this device, where the server cannot see it: the form is made there, once it is found. */
export function LoadedOnDevice({ storeId, ...props }: { storeId: string; stations: readonly StationChoice[]; events: readonly EventChoice[] }) {
  const [shelf, setShelf] = useState<DraftShelf | null>(null);
  useEffect(() => {
    const opening: { shelf: DraftShelf | null; isOver: boolean } = { shelf: null, isOver: false };
    void openShelf(`${storeId} hand-readings`).then((opened) => {
      opening.shelf = opened;
      if (opening.isOver) opened.close();
      else setShelf(opened);
    });
    return () => {
      opening.isOver = true;
      opening.shelf?.close();
    };
  }, [storeId]);
  return shelf === null ? <Loading /> : <Form {...props} shelf={shelf} />;
}

function Loading() {
  return <p role="status" className={styles.loading}>Loading the form…</p>;
}
