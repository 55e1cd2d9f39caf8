import { randomUUID } from 'node:crypto';
import {
  Catch,
  HttpException,
  Logger,
  type ArgumentsHost,
  type ExceptionFilter,
} from '@nestjs/common';
import { DomainError, type ErrorDetail } from '../../errors.js';
import { StorageUnavailable } from '../../storage/storage-unavailable.js';
import { Page, pageHtml } from '../layout/page.js';
import { SignInNeeded } from '../session/session.guard.js';
import { en } from '../texts/en.js';
import { errorStatus } from './error-status.js';
import {
  sendElsewhere,
  sendPage,
  wantsJson,
  type PageReply,
  type PageRequest,
} from './exchange.js';

/** A failure ready to be shown: the same for a page and for JSON. */
interface ShownError {
  readonly status: number;
  readonly code: string;
  readonly title: string;
  readonly message: string;
  readonly hint: string;
  readonly details: readonly ErrorDetail[];
}

const words = en.errors;

const titles: Readonly<Record<string, string>> = {
  'not-found': words.notFound,
  'not-allowed': words.notAllowed,
  conflict: words.conflict,
};

function shownDomainError(error: DomainError): ShownError {
  const { code, message, hint, details } = error;
  const status = error instanceof StorageUnavailable ? 503 : errorStatus[code];
  return { status, code, title: titles[code] ?? words.title, message, hint, details };
}

/** The refusals that server and framework make before one of our handlers is reached. */
const transportErrors: Readonly<Record<number, Omit<ShownError, 'status' | 'details'>>> = {
  400: {
    code: 'invalid-input',
    title: words.title,
    message: words.unreadable,
    hint: words.unreadableHint,
  },
  404: {
    code: 'not-found',
    title: words.notFound,
    message: words.noPage,
    hint: words.noPageHint,
  },
  413: {
    code: 'invalid-input',
    title: words.title,
    message: words.tooLarge,
    hint: words.tooLargeHint,
  },
  415: {
    code: 'invalid-input',
    title: words.title,
    message: words.wrongKind,
    hint: words.wrongKindHint,
  },
  429: {
    code: 'not-allowed',
    title: words.notAllowed,
    message: words.tooMany,
    hint: words.tooManyHint,
  },
};

function statusOf(error: unknown): number | undefined {
  if (error instanceof HttpException) return error.getStatus();
  if (typeof error !== 'object' || error === null || !('statusCode' in error)) return undefined;
  return typeof error.statusCode === 'number' ? error.statusCode : undefined;
}

function shownTransportError(error: unknown): ShownError | undefined {
  const status = statusOf(error);
  if (status === undefined || status < 400 || status >= 500) return undefined;
  const known = transportErrors[status] ?? transportErrors[400];
  return known && { ...known, status, details: [] };
}

function ErrorPage(props: { readonly error: ShownError; readonly request: PageRequest }) {
  const { error, request } = props;
  return (
    <Page title={error.title} viewer={request.viewer}>
      <h1>{error.title}</h1>
      <p class="lead">{error.message}</p>
      <h2>{words.whatNext}</h2>
      <p>{error.hint}</p>
      {error.details.length > 0 && (
        <>
          <h2>{words.details}</h2>
          <ul>
            {error.details.map(({ path, problem }) => (
              <li key={`${path} ${problem}`}>
                {path !== '' && <code>{path}</code>} {problem}
              </li>
            ))}
          </ul>
        </>
      )}
      <p>
        <a href="/">{words.backHome}</a>
      </p>
    </Page>
  );
}

/** Turns every failure into an answer: a page for a person, the error object for a program. */
@Catch()
export class DomainErrorFilter implements ExceptionFilter {
  readonly #log = new Logger('Faults');

  catch(error: unknown, host: ArgumentsHost): void {
    const http = host.switchToHttp();
    const request = http.getRequest<PageRequest>();
    const reply = http.getResponse<PageReply>();
    if (reply.sent) return;

    if (error instanceof SignInNeeded && request.method === 'GET' && !wantsJson(request)) {
      const next = request.url === '/' ? '' : `?next=${encodeURIComponent(request.url)}`;
      sendElsewhere(reply, `/sign-in${next}`);
      return;
    }
    const shown =
      error instanceof DomainError
        ? shownDomainError(error)
        : (shownTransportError(error) ?? this.#fault(error));
    if (error instanceof StorageUnavailable) this.#log.error(`${error.message} ${error.hint}`);

    if (wantsJson(request)) {
      const { code, message, hint, details } = shown;
      void reply
        .status(shown.status)
        .header('cache-control', 'no-store')
        .send({ error: { code, message, hint, details } });
      return;
    }
    sendPage(reply, pageHtml(<ErrorPage error={shown} request={request} />), shown.status);
  }

  /** The reference is all that the outside gets; the rest stands in the log. */
  #fault(error: unknown): ShownError {
    const reference = randomUUID().slice(0, 8);
    this.#log.error(
      `Fault ${reference}: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}`,
    );
    return {
      status: 500,
      code: 'internal',
      title: words.fault,
      message: words.faultMessage,
      hint: `${words.faultHint} ${reference}`,
      details: [],
    };
  }
}
