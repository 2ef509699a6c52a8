/**
 * Does something when nothing is pressed any more. A field is left as soon as another control is pressed: a message that
 * came up then would move that control from under the hand, and the press would do nothing.
 */
export function onceLifted(act: () => void): void {
  if (document.querySelector(":active") === null) act();
  else globalThis.addEventListener("pointerup", () => { setTimeout(act); }, { once: true });
}
