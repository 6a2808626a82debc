import type { FindAnswer } from '../../shared/schemas/find';
import { formatSepArcsec } from './quantities';

export interface FindSuggestion {
  number: number;
  text: string;
  /** Why it is offered: the number, the distance, or how the name differs. */
  remark: string;
}

/** What the find field offers, at most `most`: what is exactly meant first, then near misses, named as such. */
export function findSuggestions(answer: FindAnswer, most: number): FindSuggestion[] {
  const exact = answer.exact.map((object) => ({
    number: object.number,
    text:
      object.alias === null || object.alias === object.name
        ? object.name
        : `${object.alias} = ${object.name}`,
    remark: object.sepArcsec === null ? `no. ${object.number}` : formatSepArcsec(object.sepArcsec),
  }));
  const near = answer.nearMisses.map((miss) => ({
    number: miss.number,
    text: miss.alias === miss.name ? miss.alias : `${miss.alias} = ${miss.name}`,
    remark: `near miss: ${miss.reason}`,
  }));
  return [...exact, ...near].slice(0, most);
}
