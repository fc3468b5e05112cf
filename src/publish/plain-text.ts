/**
 * Names and messages come from files of unknown origin. What a terminal would act on (control characters, escape
 * sequences, changes of writing direction) is replaced; line breaks and tabs may stay.
 */

const DIRECTION = /[\u061c\u200e\u200f\u2028\u2029\u202a-\u202e\u2066-\u2069\ufeff]/g;

/** Text for a terminal: control characters but for line breaks and tabs become "?". */
export function terminalText(text: string): string {
  let out = '';
  for (const c of text.replace(DIRECTION, '?')) {
    const code = c.codePointAt(0)!;
    const control = (code < 32 && c !== '\n' && c !== '\t') || (code >= 127 && code < 160);
    out += control ? '?' : c;
  }
  return out;
}

/** Text on one line: line breaks and tabs too become blanks. */
export function oneLine(text: string): string {
  return terminalText(text.replace(/[\r\n\t\v\f]+/g, ' ')).trim();
}

/** Text shortened to a width, with dots where something is missing. */
export function shortened(text: string, width: number): string {
  const letters = [...text];
  return letters.length <= width ? text : `${letters.slice(0, Math.max(0, width - 2)).join('')}..`;
}

/** Words wrapped to a width, following lines indented. */
export function wrapped(text: string, width: number, indent = ''): string {
  const lines: string[] = [];
  let line = '';
  for (const word of oneLine(text).split(/ +/)) {
    if (line !== '' && line.length + 1 + word.length > width) {
      lines.push(line);
      line = indent + word;
    } else line = line === '' ? word : `${line} ${word}`;
  }
  lines.push(line);
  return lines.join('\n');
}

/**
 * A file name's stem out of any text: letters, digits, dots, dashes and underscores, not hidden, not a device name,
 * short enough for any file system.
 */
export function fileStem(text: string, fallback = 'boat'): string {
  const plain = text
    .normalize('NFC')
    .replace(/[^\p{L}\p{N}._-]+/gu, '-')
    .replace(/^[.-]+|[.-]+$/g, '');
  const stem = [...plain]
    .slice(0, 40)
    .join('')
    .replace(/[.-]+$/, '');
  if (stem === '') return fallback;
  return /^(con|prn|aux|nul|com\d|lpt\d)(\.|$)/i.test(stem) ? `${fallback}-${stem}` : stem;
}
