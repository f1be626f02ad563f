import type { QuestionView } from "@shared/contracts/imports";
import type { PointSet, Question } from "@shared/domain/log-files/recognition";

/** The contract's arrays are mutable, the domain's are not. */
export function presentPointSet({ name, columns }: PointSet) {
  return { name, columns: columns.map((column) => ({ ...column })) };
}

export function presentQuestion(question: Question): QuestionView {
  switch (question.code) {
    case "dateOrder":
      return {
        ...question,
        choices: [...question.choices],
        stepSeconds: [...question.stepSeconds],
      };
    case "flowUnit":
      return { ...question, choices: [...question.choices] };
    case "columnUnit":
      return { ...question, choices: [...question.choices] };
    case "statusWords":
      return { ...question, words: question.words.map((word) => ({ ...word })) };
    case "alikeColumns":
      return {
        ...question,
        columnIndexes: [...question.columnIndexes],
        meanings: [...question.meanings],
      };
    case "whichSet":
      return { ...question, sets: question.sets.map(presentPointSet) };
    default:
      return { ...question };
  }
}
