/** A check as its file writes it; the tolerance is that of the arithmetic where none is given. */
import type { VerifyRow } from '../../model/verification.ts'

export type Check = Omit<VerifyRow, 'agrees' | 'tolerance'> & { tolerance?: number }
