/** What stands where in a source file, as far as a scanner can tell without parsing. */
export interface SourceText {
  /** As it was. */
  readonly whole: string;
  /** The same length and lines, with blanks for comments and for the contents of strings and regular expressions. */
  readonly code: string;
}

/** A `/` behind one of these begins a regular expression; behind anything else it divides. */
const BEFORE_REGEX = /(?:^|[(,=:[!&|?{};+\-*%<>~^]|\b(?:return|typeof|case|in|of|do|else|void|throw))\s*$/;

/** Tells code from comments, strings, templates and regular expressions. */
export function sourceText(whole: string): SourceText {
  let code = '';
  let i = 0;
  // Depth of braces in each template expression being scanned.
  const templates: number[] = [];
  const keep = (count: number): void => {
    code += whole.slice(i, i + count);
    i += count;
  };
  const blankTo = (end: number): void => {
    code += whole.slice(i, end).replaceAll(/[^\n]/g, ' ');
    i = end;
  };
  /** Past the text of a template, up to its end or to the next `${`. */
  const template = (): void => {
    const end = endOf(whole, i, /[`]|\$\{/y);
    blankTo(end);
    if (whole.startsWith('${', end)) {
      keep(2);
      templates.push(0);
    } else {
      keep(1);
    }
  };

  while (i < whole.length) {
    const rest = whole.slice(i, i + 2);
    const letter = rest[0];
    if (rest === '//') blankTo(indexOrEnd(whole, '\n', i));
    else if (rest === '/*') blankTo(Math.min(whole.length, indexOrEnd(whole, '*/', i + 2) + 2));
    else if (letter === "'" || letter === '"') {
      keep(1);
      blankTo(endOf(whole, i, letter === "'" ? /['\n]/y : /["\n]/y));
      keep(1);
    } else if (letter === '`') {
      keep(1);
      template();
    } else if (letter === '/' && BEFORE_REGEX.test(code.slice(-40))) {
      keep(1);
      blankTo(endOfRegex(whole, i));
      keep(1);
    } else if (letter === '}' && templates.at(-1) === 0) {
      keep(1);
      templates.pop();
      template();
    } else {
      if (templates.length > 0 && letter === '{') templates[templates.length - 1]++;
      if (templates.length > 0 && letter === '}') templates[templates.length - 1]--;
      keep(1);
    }
  }
  return { whole, code };
}

/** Counted from 1. */
export function lineOf(text: string, index: number): number {
  return text.slice(0, index).split('\n').length;
}

function indexOrEnd(text: string, wanted: string, from: number): number {
  const index = text.indexOf(wanted, from);
  return index < 0 ? text.length : index;
}

/** Where a sticky pattern first matches, escaped letters left out; the text's end if nowhere. */
function endOf(text: string, from: number, stop: RegExp): number {
  for (let i = from; i < text.length; i++) {
    if (text[i] === '\\') {
      i++;
      continue;
    }
    stop.lastIndex = i;
    if (stop.test(text)) return i;
  }
  return text.length;
}

/** The closing slash: one in a character class does not count. */
function endOfRegex(text: string, from: number): number {
  let inClass = false;
  for (let i = from; i < text.length && text[i] !== '\n'; i++) {
    if (text[i] === '\\') i++;
    else if (text[i] === '[') inClass = true;
    else if (text[i] === ']') inClass = false;
    else if (text[i] === '/' && !inClass) return i;
  }
  return indexOrEnd(text, '\n', from);
}
