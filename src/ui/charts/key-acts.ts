/** Handles the keys that are listed and leaves every other, and every shortcut of the browser, alone. */
export const keyActs =
  (acts: Readonly<Record<string, (event: KeyboardEvent) => void>>) =>
  (event: KeyboardEvent): void => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const act = acts[event.key];
    if (!act) return;
    event.preventDefault();
    act(event);
  };
