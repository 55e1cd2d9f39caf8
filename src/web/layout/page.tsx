import type { ComponentChildren, VNode } from 'preact';
import { renderToString } from 'preact-render-to-string';
import { formTokenField } from '../forms/form-token.js';
import type { Viewer } from '../session/viewer.js';
import { en, type NoticeName } from '../texts/en.js';
import { staticPath } from './static-files.js';
import { navigation } from './navigation.js';

export interface PageProps {
  readonly title: string;
  readonly viewer?: Viewer | undefined;
  /** Path of the page itself: marks its place in the navigation. */
  readonly path?: string | undefined;
  readonly notice?: NoticeName | undefined;
  /** Something in the form below is wrong; said in the title too, which is read out first. */
  readonly hasErrors?: boolean | undefined;
  /** For tables and drawings that need the whole width. */
  readonly wide?: boolean | undefined;
  /** Scripts of this page: compiled files of src/web/islands, by name. */
  readonly scripts?: readonly string[] | undefined;
  readonly children: ComponentChildren;
}

function isHere(href: string, path: string | undefined): boolean {
  if (path === undefined) return false;
  return href === '/' ? path === '/' : path === href || path.startsWith(`${href}/`);
}

function Masthead({ viewer, path }: Pick<PageProps, 'viewer' | 'path'>): VNode {
  return (
    <header class="masthead">
      <p class="product">
        <a href="/">{en.product}</a>
      </p>
      {viewer && (
        <nav aria-label={en.mainNavigation}>
          <ul>
            {navigation.map(({ href, label }) => (
              <li key={href}>
                <a href={href} aria-current={isHere(href, path) ? 'page' : undefined}>
                  {label}
                </a>
              </li>
            ))}
          </ul>
        </nav>
      )}
      {viewer && (
        <div class="who">
          <a href="/account" aria-current={isHere('/account', path) ? 'page' : undefined}>
            <span class="unseen">{en.signedInAs} </span>
            {viewer.name}
          </a>
          <form method="post" action="/sign-out">
            <input type="hidden" name={formTokenField} value={viewer.formToken} />
            <button type="submit" class="quiet">
              {en.signOut}
            </button>
          </form>
        </div>
      )}
    </header>
  );
}

/** The frame of every page. */
export function Page(props: PageProps): VNode {
  const { title, viewer, path, notice, hasErrors, wide, scripts, children } = props;
  return (
    <html lang={en.lang}>
      <head>
        <meta charset="utf-8" />
        <meta name="viewport" content="width=device-width, initial-scale=1" />
        <title>{`${hasErrors ? `${en.errorPrefix} ` : ''}${title} \u2013 ${en.product}`}</title>
        <meta name="color-scheme" content="light dark" />
        <link rel="icon" href={staticPath('styles/mark.svg')} type="image/svg+xml" />
        <link rel="stylesheet" href={staticPath('styles/stillair.css')} />
        <link rel="stylesheet" href={staticPath('styles/planning.css')} />
        {scripts?.map((name) => (
          <script key={name} type="module" src={staticPath(`islands/${name}`)} />
        ))}
      </head>
      <body>
        <a class="skip" href="#content">
          {en.skip}
        </a>
        <Masthead viewer={viewer} path={path} />
        <main id="content" tabIndex={-1} class={wide ? 'wide' : undefined}>
          {notice && (
            <p class="notice" role="status">
              {en.notices[notice]}
            </p>
          )}
          {children}
        </main>
        <footer class="foot">
          <p>{en.footer}</p>
        </footer>
      </body>
    </html>
  );
}

/** A page as the text that is sent. */
export function pageHtml(page: VNode): string {
  return `<!doctype html>\n${renderToString(page)}`;
}
