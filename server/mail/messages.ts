import type { Message } from './mailer';

/** The messages we send: plain text, what happened first, then what to do, then the link. */

export interface CubeNews {
  to: string;
  /** Whom we write to. */
  name: string;
  cubeName: string;
  regionName: string;
  /** The cube's page. */
  url: string;
}

export const cubeReady = ({ to, name, cubeName, regionName, url }: CubeNews): Message => ({
  to,
  subject: `Ready: ${cubeName}`,
  text: letter(name, [`Your cube ${cubeName} in ${regionName} has been read and can be looked at:`, url]),
});

/** `problem` is the one kept on the cube's record. */
export const cubeFailed = ({
  to,
  name,
  cubeName,
  regionName,
  url,
  problem,
}: CubeNews & { problem: { title: string; detail: string } }): Message => ({
  to,
  subject: `Could not be read: ${cubeName}`,
  text: letter(name, [
    `Your cube ${cubeName} in ${regionName} could not be read. ${problem.title}:`,
    problem.detail,
    `From its page you can try again, or remove it and upload another file:\n${url}`,
  ]),
});

const letter = (name: string, paragraphs: string[]): string =>
  [`Dear ${name},`, ...paragraphs, 'Outswell'].join('\n\n') + '\n';
