/** One answer of `WalkAnswers`. `off` answers are shown, with the reason why they cannot be given in `text`. */
export interface Answer {
  id: string;
  title: string;
  text?: string;
  off?: boolean;
}
