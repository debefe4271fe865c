/** The version of this program, as package.json has it: records say which one wrote them. */
export const PROGRAM_VERSION = '0.1.0'
