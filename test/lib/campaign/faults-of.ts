import { CampaignError, type Fault } from '../../../lib/campaign/fault.js';

/** The faults that a reading throws; none if it succeeds. */
export function faultsOf(read: () => unknown): readonly Fault[] {
  try {
    read();
  } catch (error) {
    if (error instanceof CampaignError) return error.faults;
    throw error;
  }
  return [];
}

/** The rest of the line that a fault points at. */
export const textAt = (text: string, { line, column }: Fault): string =>
  text.split('\n')[(line ?? 0) - 1]?.slice((column ?? 0) - 1) ?? '';
