/** What stands in README.txt of every archive: it must make sense to somebody who has never seen the program. */
export function archiveReadme(projectName: string): string {
  return `${projectName}
Everything that Turnwright holds of this mount, in open formats. All text is UTF-8. Times are UTC (ISO 8601), angles
degrees, lengths of arc seconds of arc on the axis (positive: the axis is ahead, that is too far west).

manifest.json     Format and version, when and by which version this was written, and every other file with its length
                  and SHA-256, in the order in which they are read again.
project.json      The mount's name, its drive trains (the last one holds), telescopes and cameras, the choices of the
                  last import.
runs/NNN-name/    One recording each. original/ holds the file as it was brought in, byte for byte; run.json says which
                  columns were read, in which units, how they become an error of the axis, and what is known of the
                  night. samplesSha256 is the hash of the columns as they were read.
analyses/NNN-name/     analysis.json: the recipe (all settings), the result (all figures), the version of the
                  computation, the hash of the samples. "run" names the folder of the recording. notes.json: the notes
                  on it, each pinned to a time, a period, a worm angle or the whole.
corrections/NNN-name/  table.csv and table.json: the table as it can be loaded or read. correction.json: the same for
                  reading it in again; "analysis" names the folder of the analysis that it was made from.
people.csv        Who had access when this was written, and in which role. No e-mail addresses.
trail.csv         Who did what and when. trail.json is the same for reading it in again: a CSV cell that a spreadsheet
                  would take for a formula has an apostrophe in front.
schemas/          A JSON Schema for every JSON file above; each file names its own as "$schema".

Folders are numbered by the time of what they hold. A folder's or a file's name may be shortened or changed where a file
system would refuse it; the true name stands in the JSON beside it.

To bring it in again: Projects, then Bring in an archive. The archive must be unchanged. It becomes a new project of the
person who brings it in; who made what, and when, stays as it was. Not in the archive: passwords, e-mail addresses, share
links, invitations, who was mentioned in a note, whether the project was archived, and where archives were brought in.
People do not get access by it: people.csv is for reading only.
`
}
