import Link from "next/link";
import text from "./page-text.module.css";

export default function NotFound() {
  return (
    <div className={text.page}>
      <h1 className={text.title}>Nothing here</h1>
      <p className={text.lead}>This address leads to no event, station or screen. It may have been mistyped.</p>
      <p className={text.action}>
        <Link href="/">All events</Link> · <Link href="/stations">All stations</Link>
      </p>
    </div>
  );
}
