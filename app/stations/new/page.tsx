import type { Metadata } from "next";
import { StationForm } from "../station-form.tsx";
import styles from "../station-form.module.css";

export const metadata: Metadata = { title: "New station" };

export default function NewStationPage() {
  return (
    <div className={styles.page}>
      <h1 className={styles.title}>New station</h1>
      <StationForm station={null} />
    </div>
  );
}
