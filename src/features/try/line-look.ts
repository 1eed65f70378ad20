/** How each line is drawn, in order: colour and dash both tell it, and a letter stands at its end. Things as they stand have the first. */
export type LineLook = { letter: string; token: string; dash: readonly number[]; width: number };

export const BASE_LOOK: LineLook = { letter: '', token: '--color-soft', dash: [4, 4], width: 1.4 };

const CHANGE_LOOKS: readonly LineLook[] = [
  { letter: 'A', token: '--color-ink', dash: [], width: 2.8 },
  { letter: 'B', token: '--color-credit', dash: [12, 4], width: 2.2 },
  { letter: 'C', token: '--color-roof', dash: [7, 3, 2, 3], width: 2.2 },
  { letter: 'D', token: '--color-incentive', dash: [2, 4], width: 2.6 },
];

export function changeLook(index: number): LineLook {
  return CHANGE_LOOKS[index % CHANGE_LOOKS.length] ?? BASE_LOOK;
}

/** A piece of the line, for the key. */
export function dashText(look: LineLook): string {
  return look.dash.join(' ');
}
