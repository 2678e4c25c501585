import { ref, type Ref } from 'vue';

const turns = ref(0);

/** Quarter turns of the map, to match where one stands: the same on every screen until it is turned again (A1). */
export function useMapTurn(): { turns: Ref<number>; turn: () => void } {
  return { turns, turn: () => void (turns.value = (turns.value + 1) % 4) };
}
