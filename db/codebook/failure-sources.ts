/** Where the failure kinds of SAE J1939-73 and of the standard P-codes come from. */
export const STANDARD = 'SAE J1939-73 Appendix A / ISO 11783-12 Annex E; own words'
export const STANDARD_MEMORY = 'SAE J1939-73 Appendix A, from memory; own words'
export const PCODE_KIND = 'SAE J2012 / ISO 15031-6 suffix family; own words'
/** The figures by role: nobody counted them. */
export const FIGURES = 'figures by role are guesses from common practice, no source'
