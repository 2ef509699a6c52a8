import { DomEvent } from "leaflet";
import base from "./base.module.css";

/** The way back to all that a chart has to show. */
export function ShowAll({ onShow }: { onShow: () => void }) {
  return <button ref={keepClicks} type="button" className={base.showAll} onClick={onShow}>Show all</button>;
}

/** A second quick click on the button is none on the map below it. */
function keepClicks(button: HTMLButtonElement | null): void {
  if (button !== null) DomEvent.disableClickPropagation(button);
}
