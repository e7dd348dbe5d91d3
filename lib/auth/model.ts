import { z } from 'zod';

export const passwordLength = { least: 10, most: 200 } as const;

/** What a person types to say who they are: an e-mail address or a learner number. */
const identifier = z.string().trim().min(1, 'Give your e-mail or learner number.').max(200, 'Use at most 200 characters.');

/** A new password: length counts, not the kinds of characters (NIST SP 800-63B, 5.1.1.2). */
export const newPassword = z
  .string()
  .min(passwordLength.least, `Use at least ${passwordLength.least} characters; a few unrelated words do well.`)
  .max(passwordLength.most, `Use at most ${passwordLength.most} characters.`)
  .refine((text) => new Set(text).size >= 4, 'Use more than three different characters.');

export const signInSchema = z.object({
  identifier,
  password: z.string().min(1, 'Give your password.').max(passwordLength.most, `Use at most ${passwordLength.most} characters.`),
});
export type SignInInput = z.infer<typeof signInSchema>;

export const slipSchema = z.object({
  learnerNumber: z.string().trim().min(1, 'Give the learner number on your slip.').max(60, 'Use at most 60 characters.'),
  code: z.string().trim().min(1, 'Give the code on your slip.').max(40, 'Use at most 40 characters.'),
});
export type SlipInput = z.infer<typeof slipSchema>;

export const resetRequestSchema = z.object({ identifier });
export type ResetRequestInput = z.infer<typeof resetRequestSchema>;

export const redeemSchema = z.object({ token: z.string().min(20).max(100), password: newPassword });
export type RedeemInput = z.infer<typeof redeemSchema>;

export const changePasswordSchema = z.object({ current: z.string().max(passwordLength.most), password: newPassword });
export type ChangePasswordInput = z.infer<typeof changePasswordSchema>;

export const linkPurposes = ['invitation', 'reset'] as const;
export type LinkPurpose = (typeof linkPurposes)[number];

/** The same words whether the account is unknown, closed, without a password, or the password is wrong. */
export const wrongSignIn = 'The e-mail, learner number or password is not right.';
export const wrongSlip = 'The learner number or code is not right, or the code was used or has expired. Ask the exam office or your proctor for a new slip.';
export const deadLink = 'This link was used, was replaced by a newer one, or has expired. Have a new one sent.';

/** Says how long to wait, in whole seconds. */
export const slowed = (seconds: number): string =>
  `There were several wrong tries. Wait ${seconds} ${seconds === 1 ? 'second' : 'seconds'}, then try again.`;
