// What runs in the editor's page: plain JavaScript, as the browser gets it.

/** The middle of the first occurrence of `word` as a whole word in the text on the screen, in pixels; null where there is none. */
export function placeOfWord(word) {
  for (const line of document.querySelectorAll('.editor-instance .view-line')) {
    const texts = document.createTreeWalker(line, NodeFilter.SHOW_TEXT);
    for (let text = texts.nextNode(); text; text = texts.nextNode()) {
      const found = new RegExp(`(?<!\\w)${word}(?!\\w)`).exec(text.data);
      if (!found) continue;
      const range = document.createRange();
      range.setStart(text, found.index);
      range.setEnd(text, found.index + word.length);
      const box = range.getBoundingClientRect();
      return { x: box.x + box.width / 2, y: box.y + box.height / 2 };
    }
  }
  return null;
}

/** The width in pixels that an image is shown with; 0 as long as it has not been read. */
export const shownWidth = image => (image.complete && image.naturalWidth > 0 ? image.clientWidth : 0);
