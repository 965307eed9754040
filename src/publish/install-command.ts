import type { System } from './system.ts'

/** The command of each Linux distribution that installs a browser; `ID` and `ID_LIKE` as in os-release. */
const LINUX: Readonly<Record<string, string>> = {
  // Ubuntu's own package archive carries Chromium as a snap only.
  ubuntu: 'snap install chromium',
  debian: 'apt-get install -y chromium',
  fedora: 'dnf install -y chromium',
  rhel: 'dnf install -y chromium',
  suse: 'zypper install -y chromium',
  arch: 'pacman -S --noconfirm chromium',
  alpine: 'apk add chromium',
}

/** The command that installs a browser on this system, with `sudo` where it is needed; undefined when it is not known. */
export function installCommand(system: System): string | undefined {
  if (system.platform === 'darwin') return 'brew install --cask google-chrome'
  if (system.platform === 'win32') return 'winget install --id Google.Chrome'
  const command = distributions(system.osRelease).flatMap((id) => LINUX[id] ?? [])[0]
  return command && (system.root ? command : `sudo ${command}`)
}

/** The distribution's own id, then those it is like. */
function distributions(osRelease: string): string[] {
  const field = (name: string) => new RegExp(`^${name}="?([^"\\n]*)"?$`, 'm').exec(osRelease)?.[1] ?? ''
  return `${field('ID')} ${field('ID_LIKE')}`.split(/\s+/).filter(Boolean)
}
