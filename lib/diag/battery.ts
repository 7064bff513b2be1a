/** At or below these rest volts a battery counts as empty, whatever the sum says (rule R10; battery-charge.ts). */
export const EMPTY_AT_VOLTS = 11.9
