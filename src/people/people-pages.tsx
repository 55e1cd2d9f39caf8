import type { VNode } from 'preact';
import type { Account } from '../storage/people.repository.js';
import { emptyForm, ErrorSummary, Form, TextField, type FormState } from '../web/forms/fields.js';
import { Table } from '../web/layout/parts.js';
import { Page } from '../web/layout/page.js';
import type { Viewer } from '../web/session/viewer.js';
import { en, type NoticeName } from '../web/texts/en.js';

export function SignInPage(props: {
  readonly next?: string | undefined;
  readonly notice?: NoticeName | undefined;
  readonly state?: FormState | undefined;
  readonly isFirstStart: boolean;
}): VNode {
  const state = props.state ?? emptyForm;
  const words = en.signIn;
  return (
    <Page title={words.title} notice={props.notice} hasErrors={state.problems.length > 0}>
      <h1>{words.title}</h1>
      <ErrorSummary problems={state.problems} />
      {props.isFirstStart && <p class="notice">{words.noAccountYet}</p>}
      <Form action="/sign-in">
        {props.next !== undefined && <input type="hidden" name="next" value={props.next} />}
        <TextField
          name="email"
          label={words.email}
          type="email"
          autocomplete="username"
          required
          state={state}
        />
        <TextField
          name="password"
          label={words.password}
          type="password"
          autocomplete="current-password"
          required
          state={state}
        />
        <button type="submit">{words.button}</button>
      </Form>
    </Page>
  );
}

export function FirstAccountPage(props: {
  readonly token: string;
  readonly state?: FormState | undefined;
}): VNode {
  const state = props.state ?? emptyForm;
  const words = en.firstLink;
  return (
    <Page title={words.title} hasErrors={state.problems.length > 0}>
      <h1>{words.title}</h1>
      <ErrorSummary problems={state.problems} />
      <p class="lead">{words.intro}</p>
      <Form action={`/first/${encodeURIComponent(props.token)}`}>
        <TextField name="name" label={words.name} autocomplete="name" required state={state} />
        <TextField
          name="email"
          label={words.email}
          hint={words.emailHint}
          type="email"
          autocomplete="username"
          required
          state={state}
        />
        <TextField
          name="password"
          label={words.password}
          hint={words.passwordHint}
          type="password"
          autocomplete="new-password"
          required
          state={state}
        />
        <TextField
          name="passwordAgain"
          label={words.passwordAgain}
          type="password"
          autocomplete="new-password"
          required
          state={state}
        />
        <button type="submit">{words.button}</button>
      </Form>
    </Page>
  );
}

export function AccountPage(props: {
  readonly viewer: Viewer;
  /** Everybody with an account, for an administrator. */
  readonly people?: readonly Account[] | undefined;
}): VNode {
  const { viewer, people } = props;
  const words = en.account;
  return (
    <Page title={words.title} viewer={viewer} path="/account">
      <h1>{words.title}</h1>
      <dl class="facts">
        <dt>{words.name}</dt>
        <dd>{viewer.name}</dd>
        <dt>{words.email}</dt>
        <dd>{viewer.email}</dd>
        <dt>{words.role}</dt>
        <dd>{en.roles[viewer.role]}</dd>
      </dl>
      {people && (
        <Table
          caption={words.people}
          columns={[words.name, words.email, words.role]}
          rows={people.map(({ name, email, role }) => [name, email, en.roles[role]])}
          rowHeads
        />
      )}
    </Page>
  );
}
