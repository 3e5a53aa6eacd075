/** A text as CSS takes it: what could end a string or the style is written as its code. */
const cssString = (text: string) => `"${text.replace(/[^\p{L}\p{N} .,:()+–-]/gu, (character) => `\\${character.codePointAt(0)!.toString(16)} `)}"`;

/** What stands at the foot of every sheet when this page is printed; app/globals.css puts it there, with the page's number. */
export function PaperName({ what }: { what: string }) {
  return <style>{`:root { --paper-what: ${cssString(`${what}. `)}; }`}</style>;
}

/** The same for the house that prints. A demo says so on paper too. */
export function PaperHouse({ words, demo }: { words: string; demo: boolean }) {
  return <style>{`:root { --paper-house: ${cssString(`${words}${demo ? ". Demo: invented work" : ""}`)}; }`}</style>;
}
