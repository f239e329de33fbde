import { capture, isRoot, run, SetUpError } from './processes.mjs'

/** Installs Debian packages when we may; otherwise says which command does it. */
export async function aptInstall(packages, purpose) {
  const command = `apt-get install --yes --no-install-recommends ${packages.join(' ')}`
  const hasApt = capture('apt-get', ['--version']).ok
  if (!hasApt || !isRoot()) {
    const how = hasApt
      ? `Install it with\n\n    sudo ${command}\n`
      : `Install ${packages.join(', ')} with your system's tools`
    throw new SetUpError(`${purpose} is missing on this machine. ${how}\nand start again.`)
  }
  console.log(`Installing ${packages.join(', ')} (${purpose}) …`)
  const options = { env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' } }
  await run('apt-get', ['update', '--quiet', '--quiet'], options)
  const [program, ...args] = command.split(' ')
  if ((await run(program, [...args, '--quiet'], options)) !== 0) {
    throw new SetUpError(`${purpose} could not be installed. Run "${command}" and look at what it says.`)
  }
}
