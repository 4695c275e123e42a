/** Version of the mathematics and of the words it gives. Every revision, file and replay names it. */
export const engineVersion = '1.1.0';
