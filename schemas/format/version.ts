/** The version of the format that this release reads; `lanewright:` in a file. */
export const FORMAT_VERSION = 1;
