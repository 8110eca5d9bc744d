/** Templates compiled for one report, and what all pages share. */
import { createHash } from 'node:crypto';
import Handlebars from 'handlebars';

/** Renders the page `pages/<name>.hbs` with a view. Text of the view is always escaped. */
export type RenderPage = (name: string, view: object) => string;

/**
 * Compiles templates: every `.hbs` is a partial under its path without extension, `style.css` goes into the page and its
 * hash into the content security policy.
 * @param templates path below templates/ → text. @throws Error when a page, a partial, `style.css` or a value is missing.
 */
export function compileTemplates(templates: Readonly<Record<string, string>>): RenderPage {
  const engine = Handlebars.create();
  engine.registerHelper('eq', (a: unknown, b: unknown) => a === b);
  for (const [path, text] of Object.entries(templates)) {
    if (path.endsWith('.hbs')) engine.registerPartial(path.slice(0, -4), text);
  }
  const style = lineFeeds(textOf(templates, 'style.css'));
  const shared = { style, styleHash: createHash('sha256').update(style, 'utf8').digest('base64') };
  return (name, view) => {
    const page = engine.compile(textOf(templates, `pages/${name}.hbs`), { strict: true });
    return page({ ...view, ...shared });
  };
}

function textOf(templates: Readonly<Record<string, string>>, path: string): string {
  const text = templates[path];
  if (text === undefined) throw new Error(`missing template ${path}`);
  return text;
}

/** A browser reads CR LF as LF before it hashes a style. */
function lineFeeds(text: string): string {
  return text.replaceAll('\r\n', '\n');
}
