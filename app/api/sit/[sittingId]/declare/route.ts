import { declare } from '@/lib/candidates/seat-commands';
import { seatCommand } from '../command';

/** Records the agreement to the declaration on the cover page. */
export const POST = seatCommand(declare);
