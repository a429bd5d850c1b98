import { StreamLanguage, type StreamParser } from '@codemirror/language';
import { tags } from '@lezer/highlight';

/** Where in its line the reader is; `column` counts the bars passed. A line that ends in `\` goes on in the next. */
interface Place {
  column: number;
  /** Whether nothing but blanks came before in this line. */
  begin: boolean;
  /** A number was just read, so a unit may stand here. */
  afterNumber: boolean;
  statement: boolean;
}

const statement = /^(?:start|let|fix|volume|in|weight|event|rate)\b/u;
const word = /^(?:where|when|for|law|net|sum|and|or|not)\b/u;
const arrow = /^(?:<=>|->|<-|→|←|⇌)/u;
const number = /^(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?/u;
const unit = /^\s?(?:\/?[a-zA-Zµμ%]+(?:\^-?\d+)?)(?:[ /*·]?(?:\/|(?<=[ *·]))[a-zA-Zµμ]+(?:\^-?\d+)?)*/u;
const name = /^\p{L}[\p{L}\p{N}_']*/u;

const parser: StreamParser<Place> = {
  name: 'notation',
  startState: () => ({ column: 0, begin: true, afterNumber: false, statement: false }),
  copyState: (place) => ({ ...place }),
  blankLine: (place) =>
    Object.assign(place, { column: 0, begin: true, afterNumber: false, statement: false }),
  token(stream, place) {
    if (stream.sol()) Object.assign(place, { column: 0, begin: true, afterNumber: false, statement: false });
    if (place.afterNumber) {
      place.afterNumber = false;
      if (place.column < 2 && stream.match(unit)) return 'unit';
    }
    if (stream.eatSpace()) return null;
    const begin = place.begin;
    place.begin = false;
    if (stream.peek() === '#') {
      stream.skipToEnd();
      return 'comment';
    }
    if (stream.eat('|')) {
      place.column += 1;
      return 'bar';
    }
    if (place.column >= 2) {
      stream.match(/^[^#]+/u);
      return 'note';
    }
    if (begin && stream.match(statement)) {
      place.statement = true;
      return 'word';
    }
    if (stream.match(arrow)) return 'arrow';
    if (stream.match(number)) {
      place.afterNumber = place.column === 1 || place.statement;
      return place.column === 1 || place.statement ? 'number' : null;
    }
    if (stream.match(word)) return 'word';
    if (stream.match(name)) return null;
    stream.next();
    return null;
  },
  languageData: { commentTokens: { line: '#' } },
  tokenTable: {
    bar: tags.separator,
    note: tags.annotation,
    arrow: tags.operatorKeyword,
    word: tags.keyword,
    unit: tags.unit,
    number: tags.number,
    comment: tags.comment,
  },
};

/** Colours of the notation of networks. Meaning is the reader's affair; this only tells columns apart. */
export const notationLanguage = StreamLanguage.define(parser);
