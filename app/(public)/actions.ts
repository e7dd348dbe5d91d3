'use server';

import { headers } from 'next/headers';
import { appDb } from '@/db/client';
import { redeemLink } from '@/lib/auth/commands';
import { requestReset } from '@/lib/auth/links';
import { type LinkPurpose, linkPurposes, type RedeemInput, redeemSchema, type ResetRequestInput, resetRequestSchema } from '@/lib/auth/model';
import { originOf } from '@/lib/auth/origin';
import { done, refuse, type Result } from '@/lib/result';

export async function askForReset(input: ResetRequestInput): Promise<Result<null>> {
  const read = resetRequestSchema.safeParse(input);
  if (!read.success) return refuse('invalid', 'Give your e-mail or learner number.', 'identifier');
  const from = await headers();
  await requestReset(appDb(), read.data.identifier, originOf((name) => from.get(name)).address);
  return done(null);
}

export async function choosePassword(purpose: LinkPurpose, input: RedeemInput): Promise<Result<null>> {
  const read = redeemSchema.safeParse(input);
  if (!read.success || !linkPurposes.includes(purpose)) return refuse('invalid', 'This password cannot be used. Choose another.', 'password');
  const redeemed = await redeemLink(appDb(), purpose, read.data);
  return redeemed.ok ? done(null) : redeemed;
}
