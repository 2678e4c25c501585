/** Names of the drawn signs. */
export type IconName =
  | 'pause'
  | 'tray'
  | 'wrench'
  | 'delete'
  | 'turnMap'
  | 'clockwise'
  | 'counterClockwise'
  | 'back'
  | 'mark'
  | 'tick'
  | 'search';
