import { startMailbox, type Mailbox } from '../fakes/mailbox';
import { makeMailer, type Mailer } from './mailer';
import { cubeFailed, cubeReady } from './messages';

const log = { info: jest.fn() };
let mailbox: Mailbox;
let mailer: Mailer;
beforeAll(async () => {
  mailbox = await startMailbox({ env: 'test' });
  mailer = makeMailer({ mail: { smtpUrl: mailbox.smtpUrl, from: 'Outswell <outswell@example.org>' } }, log);
});
afterAll(async () => {
  mailer.close();
  await mailbox.stop();
});
beforeEach(() => mailbox.messages.splice(0));

const news = {
  to: 'bram@example.org',
  name: 'Bram Ostrevant',
  cubeName: 'αβ — low latitudes',
  regionName: 'Lower arch',
  url: 'https://shells.example.org/cubes/1',
};

test('a ready cube is told with its name, its region and the link', async () => {
  await mailer.send(cubeReady(news));
  expect(mailbox.messages).toHaveLength(1);
  expect(mailbox.messages[0]).toMatchObject({
    from: 'Outswell <outswell@example.org>',
    to: ['bram@example.org'],
    subject: 'Ready: αβ — low latitudes',
  });
  expect(mailbox.messages[0]!.text.trim()).toBe(cubeReady(news).text.trim());
  expect(mailbox.messages[0]!.text).toContain(news.url);
});

test('a failed cube is told with its cause and what to do', async () => {
  const problem = { title: 'A header card cannot be used', detail: 'RESTFRQ is 0. Correct it in the file.' };
  await mailer.send(cubeFailed({ ...news, problem }));
  const { subject, text } = mailbox.messages[0]!;
  expect(subject).toContain('Could not be read');
  expect(text).toContain(problem.title);
  expect(text).toContain(problem.detail);
  expect(text).toContain(news.url);
});

test('a line break in a name makes no header of its own', async () => {
  await mailer.send(cubeReady({ ...news, cubeName: 'one\r\nBcc: someone@example.org' }));
  expect(mailbox.messages[0]!.to).toEqual(['bram@example.org']);
  const [headers] = mailbox.messages[0]!.raw.split('\r\n\r\n');
  expect(headers).not.toMatch(/^Bcc:/im);
});

test.each(['a@example.org, b@example.org', 'a@example.org\r\nRCPT TO:<b@example.org>'])(
  'the address %j does not reach two people',
  async (to) => {
    await mailer.send({ ...cubeReady(news), to }).catch(() => {});
    expect(mailbox.messages.flatMap((m) => m.to)).not.toContain('b@example.org');
  },
);

test('a refusal of the server is passed on, so that the job tries again', async () => {
  mailbox.refuse(1);
  await expect(mailer.send(cubeReady(news))).rejects.toThrow(/452|storage/);
  await mailer.send(cubeReady(news));
  expect(mailbox.messages).toHaveLength(1);
});

test('a server that is not there is an error', async () => {
  const gone = await startMailbox({ env: 'test' });
  await gone.stop();
  const lost = makeMailer({ mail: { smtpUrl: gone.smtpUrl, from: 'outswell@example.org' } }, log);
  await expect(lost.send(cubeReady(news))).rejects.toThrow(/ECONNREFUSED/);
  lost.close();
});

test('without a mail server the log says what was not sent', async () => {
  await makeMailer({ mail: null }, log).send(cubeReady(news));
  expect(log.info).toHaveBeenCalledWith(
    expect.objectContaining({ to: 'bram@example.org' }),
    expect.stringContaining('not sent'),
  );
});

test('the local mailbox refuses to run in production', async () => {
  await expect(startMailbox({ env: 'production' })).rejects.toThrow(/production refuses/);
});
