import { handIn } from '@/lib/candidates/seat-commands';
import { seatCommand } from '../command';

/** Hands the paper in; a repeated press finds it handed in. */
export const POST = seatCommand(handIn);
