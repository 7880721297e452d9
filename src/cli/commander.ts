// The library that reads command lines, met here for the files that declare commands.
export { Command, CommanderError } from 'commander';
