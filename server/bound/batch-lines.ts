import { BatchAnswers, wrong } from './batch-answer.ts';

/** Longest request, characters; a longer one is answered with an error and read past. */
export const longestRequest = 1_048_576;

/**
 * Answers the requests in a text that comes in pieces, one line of answer for each line, in order. Holds one piece
 * and one unfinished line; reads on only when its answers are taken.
 *
 * @param text UTF-8
 */
export async function* answersOf(text: AsyncIterable<Uint8Array>): AsyncGenerator<string, void, undefined> {
  const decoder = new TextDecoder();
  const lines = new RequestLines();
  for await (const piece of text) {
    const answers = lines.read(decoder.decode(piece, { stream: true }));
    if (answers !== '') yield answers;
  }
  const last = lines.end(decoder.decode());
  if (last !== '') yield last;
}

class RequestLines {
  readonly #answers = new BatchAnswers();
  #begun = '';
  /** the line that is being read is too long and was given up */
  #passing = false;

  /** The answers to the lines that end in this piece, each with its line end. */
  read(piece: string): string {
    let answers = '';
    let from = 0;
    for (let end = piece.indexOf('\n'); end >= 0; end = piece.indexOf('\n', from)) {
      answers += this.#finish(piece.slice(from, end));
      from = end + 1;
    }
    this.#begin(from === 0 ? piece : piece.slice(from));
    return answers;
  }

  end(rest: string): string {
    const answers = this.read(rest);
    return this.#begun === '' && !this.#passing ? answers : answers + this.#finish('');
  }

  #begin(piece: string): void {
    if (this.#begun.length + piece.length > longestRequest) this.#passing = true;
    this.#begun = this.#passing ? '' : this.#begun + piece;
  }

  #finish(piece: string): string {
    this.#begin(piece);
    const answer = this.#passing ? wrong(`a request of more than ${longestRequest} characters`, undefined) : this.#answers.answer(this.#begun);
    this.#begun = '';
    this.#passing = false;
    return `${answer}\n`;
  }
}
