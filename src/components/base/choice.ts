/** One way out, with its consequence. `steps` are the passes it will ask for, shown as chips between the words. */
export interface Choice {
  id: string;
  title: string;
  consequence?: string;
  steps?: string[];
  after?: string;
}
