import type { Letter, LetterBlock } from './letter';

/** The day tokens of global.css: letters are read where no style sheet of ours is. */
const GRAPHITE = '#1f2527';
const SLATE = '#566062';
const STONE = '#f6f6f3';
const HAIRLINE = '#cfd1ca';
const LINE = '#c2185b';
const FONT = "'Nunito Sans','Segoe UI',Helvetica,Arial,sans-serif";

const ENTITIES: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

/** Text as it may stand in HTML, in words and in attributes. */
export const escaped = (text: string): string => text.replace(/[&<>"']/g, (sign) => ENTITIES[sign]);

const lines = (text: string): string => escaped(text).replace(/\n/g, '<br>');

const blockHtml = (block: LetterBlock, origin: string): string => {
  switch (block.kind) {
    case 'paragraph':
      return `<p style="margin:0 0 16px">${lines(block.text)}</p>`;
    case 'quote':
      return (
        `<blockquote style="margin:0 0 16px;padding:2px 0 2px 14px;border-left:3px solid ${HAIRLINE}">` +
        `<p style="margin:0;color:${SLATE};font-size:14px">${escaped(block.by)}</p>` +
        `<p style="margin:2px 0 0">${lines(block.text)}</p></blockquote>`
      );
    case 'action': {
      const url = escaped(`${origin}${block.path}`);
      return (
        `<p style="margin:24px 0 8px"><a href="${url}" style="display:inline-block;padding:11px 22px;` +
        `background:${LINE};color:#ffffff;font-weight:600;text-decoration:none">${escaped(block.label)}</a></p>` +
        `<p style="margin:0 0 24px;font-size:13px;color:${SLATE};word-break:break-all">${url}</p>`
      );
    }
    case 'list':
      return `<ul style="margin:0 0 16px;padding:0;list-style:none;border-top:1px solid ${HAIRLINE}">${block.items
        .map(({ text, path }) => {
          const shown = path
            ? `<a href="${escaped(`${origin}${path}`)}" style="color:${GRAPHITE}">${lines(text)}</a>`
            : lines(text);
          return `<li style="padding:8px 0;border-bottom:1px solid ${HAIRLINE}">${shown}</li>`;
        })
        .join('')}</ul>`;
  }
};

/** One column on stone, with the mark’s string line on top; nothing is fetched to show it. */
export const letterHtml = (letter: Letter, origin: string): string => `<!doctype html>
<html lang="en-GB">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${escaped(letter.subject)}</title>
</head>
<body style="margin:0;padding:24px 12px;background:${STONE};color:${GRAPHITE};font-family:${FONT};font-size:16px;line-height:1.5">
<div style="max-width:560px;margin:0 auto">
<p style="margin:0 0 24px;padding:0 0 8px;border-bottom:2px solid ${LINE};font-size:18px;font-weight:700">Evenlay</p>
<p style="margin:0 0 16px">${letter.name ? `Hello ${escaped(letter.name)},` : 'Hello,'}</p>
${letter.blocks.map((block) => blockHtml(block, origin)).join('\n')}
<p style="margin:32px 0 0;padding:10px 0 0;border-top:1px solid ${HAIRLINE};font-size:13px;color:${SLATE}">${lines(letter.why)}</p>
</div>
</body>
</html>
`;
