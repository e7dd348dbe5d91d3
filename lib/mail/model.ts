import { z } from 'zod';

/** What a message is about; more kinds are added here by the features that send them. */
export const mailKinds = ['invitation', 'reset', 'sitting', 'results', 'grade report'] as const;
export type MailKind = (typeof mailKinds)[number];

/** Kinds whose text holds a personal link: erased here once the server has taken the message. */
export const kindsWithSecret: readonly MailKind[] = ['invitation', 'reset'];

export const mailStates = ['queued', 'sending', 'accepted', 'failed', 'unsure', 'delivered'] as const;
export type MailState = (typeof mailStates)[number];

const noLineBreak = /^[^\r\n\0]*$/;

/** One line of a header: no line breaks, which would begin a header of somebody else's choosing. */
export const headerLine = z.string().trim().min(1).max(200).regex(noLineBreak, 'must be one line');
export const mailAddress = z.email('is not an e-mail address').max(254).regex(noLineBreak, 'must be one line');

/** `report` names a row of table report, whose PDF is read when the message is sent; `text` is carried as it is. */
export const attachmentSchema = z.union([
  z.object({ name: headerLine, type: headerLine, text: z.string().max(200_000) }),
  z.object({ name: headerLine, type: z.literal('application/pdf'), report: z.uuid() }),
]);
export type Attachment = z.infer<typeof attachmentSchema>;

export const outgoingMail = z.object({
  kind: z.enum(mailKinds),
  to: mailAddress,
  subject: headerLine,
  /** Plain text. Never marks (they stand behind sign-in or in the PDF). */
  body: z.string().min(1).max(100_000),
  attach: z.array(attachmentSchema).max(10).default([]),
  accountId: z.uuid().nullable().default(null),
  reportId: z.uuid().nullable().default(null),
  sittingId: z.uuid().nullable().default(null),
  madeBy: z.uuid().nullable().default(null),
  /** What the message is once and for all, such as `report <id> issue 2`: with the recipient it fixes the Message-ID. */
  once: z.string().max(200).optional(),
});
export type OutgoingMail = z.input<typeof outgoingMail>;
