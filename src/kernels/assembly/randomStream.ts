// Compiled by AssemblyScript only. What surrounds the making of draws.
export { closeStream, openStream } from './_randomWords';
