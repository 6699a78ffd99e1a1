/** The version in every answer; a test holds it equal to that of the package. */
export const version = "0.1.0";
