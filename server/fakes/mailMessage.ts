export interface ReceivedMessage {
  from: string;
  /** Of the envelope: who really gets it. */
  to: string[];
  subject: string;
  text: string;
  raw: string;
}

/** Reads a plain-text message (RFC 5322) with the encodings that our own mailer uses. */
export function readMessage(raw: string, to: string[]): ReceivedMessage {
  const end = raw.indexOf('\r\n\r\n');
  const header = (name: string) =>
    new RegExp(`^${name}: (.*(?:\r\n[ \t].*)*)`, 'im')
      .exec(raw.slice(0, end))?.[1]
      ?.replace(/\r\n[ \t]+/g, ' ') ?? '';
  const body = decode(raw.slice(end + 4), header('Content-Transfer-Encoding').toLowerCase());
  return {
    from: header('From'),
    to,
    subject: decodeWords(header('Subject')),
    text: body.replace(/\r\n/g, '\n'),
    raw,
  };
}

function decode(body: string, encoding: string): string {
  if (encoding === 'base64') return Buffer.from(body, 'base64').toString();
  if (encoding === 'quoted-printable') return unquote(body.replace(/=\r\n/g, ''));
  return body;
}

const unquote = (text: string): string =>
  Buffer.from(
    text.replace(/=([0-9A-F]{2})/g, (_, hex: string) => String.fromCharCode(parseInt(hex, 16))),
    'latin1',
  ).toString();

/** =?UTF-8?Q?…?= and =?UTF-8?B?…?= (RFC 2047); the space between two of them is not part of the text. */
const decodeWords = (text: string): string =>
  text
    .replace(/\?= =\?/g, '?==?')
    .replace(/=\?utf-8\?([qb])\?(.*?)\?=/gi, (_, kind: string, word: string) =>
      kind.toLowerCase() === 'b' ? Buffer.from(word, 'base64').toString() : unquote(word.replace(/_/g, ' ')),
    );
