import { callHelp } from '@/lib/candidates/seat-commands';
import { seatCommand } from '../command';

/** Calls the proctor to the seat. */
export const POST = seatCommand(callHelp);
