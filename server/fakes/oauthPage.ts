/** The two pages of the local sign-in provider: HTML without scripts, so that any content policy lets them work. */
interface Choice {
  people: readonly { login: string; name: string; role?: string }[];
  /** Sent along, unseen. */
  fields: { client_id: string; redirect_uri: string; state: string };
  typed?: string;
  problem?: string;
}

const escape = (value: string) => value.replace(/[&<>"']/g, (c) => `&#${c.charCodeAt(0)};`);

export function choicePage({ people, fields, typed = '', problem }: Choice): string {
  const hidden = Object.entries(fields)
    .map(([name, value]) => `<input type="hidden" name="${name}" value="${escape(value)}">`)
    .join('');
  const form = (inside: string) => `<form method="post" action="authorize">${hidden}${inside}</form>`;
  const chooser = people.map(
    (p) => `<li><button name="login" value="${escape(p.login)}"><span>${escape(p.name)}</span>
      <span class="quiet">${escape(p.role ?? p.login)}</span></button></li>`,
  );
  const invalid = problem ? ' aria-invalid="true" aria-describedby="problem" autofocus' : '';
  return layout(
    'Who are you?',
    `<p>This page stands in for GitHub on this machine: no account and no password. Choose one of the demo people,
      or type a login to come as somebody new.</p>
    ${form(`<ul>${chooser.join('')}</ul>`)}
    ${form(`<label for="login">A new login</label>
      <div class="row"><input id="login" name="login" value="${escape(typed)}" autocomplete="off" autocapitalize="none"
        spellcheck="false" maxlength="39" required${invalid}><button>Sign in</button></div>
      ${problem ? `<p id="problem" role="alert">${escape(problem)}</p>` : ''}`)}
    ${form('<button class="plain" name="decision" value="cancel">Do not sign in</button>')}`,
  );
}

export const messagePage = (title: string, message: string): string =>
  layout(title, `<p>${escape(message)}</p><p><a href="/">Back to Outswell</a></p>`);

const layout = (title: string, main: string): string => `<!doctype html>
<html lang="en">
<head>
  <meta charset="utf-8">
  <meta name="viewport" content="width=device-width, initial-scale=1">
  <meta name="color-scheme" content="light dark">
  <title>${escape(title)} · Outswell</title>
  <link rel="stylesheet" href="provider.css">
</head>
<body>
  <main>
    <svg viewBox="0 0 40 40" width="40" height="40" aria-hidden="true" fill="none" stroke="currentColor"
      stroke-width="2.5" stroke-linecap="round"><circle cx="18" cy="20" r="11"/><path d="M27 7a17 17 0 0 1 0 26"/>
      <circle cx="18" cy="20" r="1.5" fill="currentColor"/></svg>
    <h1>${escape(title)}</h1>
    ${main}
  </main>
</body>
</html>
`;

export const stylesheet = `
:root { --ground: #f5f0e6; --panel: #fdfbf6; --line: #dcd3c2; --edge: #8a8170; --text: #1b2030; --quiet: #5a6072;
  --person: #965900; --on-person: #ffffff; --error: #b3261e; }
@media (prefers-color-scheme: dark) {
  :root { --ground: #0a0f1c; --panel: #111829; --line: #26314d; --edge: #6b7796; --text: #e9edf6; --quiet: #9fabc6;
    --person: #f3ae3d; --on-person: #0a0f1c; --error: #ff7a6b; }
}
* { box-sizing: border-box; }
body { margin: 0; min-height: 100vh; display: grid; place-items: center; padding: 16px; background: var(--ground);
  color: var(--text); font: 16px/24px "Atkinson Hyperlegible Next", system-ui, sans-serif; }
main { width: 100%; max-width: 420px; padding: 24px; background: var(--panel); border: 1px solid var(--line);
  border-radius: 10px; }
svg { color: var(--person); }
h1 { font-size: 28px; line-height: 32px; margin: 8px 0; }
p { margin: 0 0 16px; color: var(--quiet); }
p[role="alert"] { color: var(--error); margin: 8px 0 0; }
ul { list-style: none; margin: 0 0 24px; padding: 0; display: grid; gap: 8px; }
label { display: block; margin-bottom: 4px; }
.row { display: flex; gap: 8px; }
form + form { margin-bottom: 16px; }
button, input { min-height: 44px; font: inherit; border-radius: 6px; padding: 0 16px; }
input { flex: 1; min-width: 0; background: var(--ground); color: var(--text); border: 1px solid var(--edge); }
button { background: var(--person); color: var(--on-person); border: 0; cursor: pointer; }
li button { width: 100%; display: flex; justify-content: space-between; gap: 16px; align-items: center;
  background: var(--ground); color: var(--text); border: 1px solid var(--edge); }
li button:hover { border-color: var(--person); }
.quiet { color: var(--quiet); font-size: 14px; }
button.plain { background: none; color: var(--quiet); padding: 0; text-decoration: underline; }
a { color: var(--person); }
:focus-visible { outline: 3px solid var(--person); outline-offset: 2px; }
`;
