import text from "../../page-text.module.css";

export default function Loading() {
  return (
    <div className={text.page} role="status">
      <p className={text.lead}>Working out where the storm was…</p>
    </div>
  );
}
