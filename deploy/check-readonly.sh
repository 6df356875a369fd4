#!/usr/bin/env bash
# Starts the published server as the container does, without a container engine: the whole file system read-only except the
# data folder, another user without any capability, an environment of its own. Needs root (for unshare, mount and setpriv).
#   deploy/check-readonly.sh [PUBLISHED_FOLDER] [ENVIRONMENT]
# PUBLISHED_FOLDER: output of `dotnet publish src/ModelLab.Web -c Release`; published anew when left out.
# ENVIRONMENT: Production (default) or Development (makes the demo project as well).
set -euo pipefail
cd "$(dirname "$0")/.."
published="${1:-}"
environment="${2:-Production}"
port="${PORT:-5247}"
user=10001

if [[ -z "$published" ]]; then
  published="artifacts/check-readonly"
  dotnet publish src/ModelLab.Web -c Release -o "$published" --nologo -v quiet
fi
published="$(realpath "$published")"
data="$(mktemp -d)"
trap 'rm -rf "$data"' EXIT
chown "$user:$user" "$data"
chmod 700 "$data"

export published environment port user data
unshare --mount --propagation private -- bash -euo pipefail <<'INSIDE'
mount --bind "$data" "$data"
# Every other mount becomes read-only, the root last; the kernel's own file systems cannot keep files and stay as they are.
while read -r target kind; do
  case "$kind" in proc | sysfs | cgroup* | devpts | mqueue) continue ;; esac
  if [[ "$target" != "$data" && -d "$target" ]]; then mount -o remount,bind,ro "$target" 2>/dev/null || true; fi
done < <(findmnt -rn -o TARGET,FSTYPE | sort -r)
for place in / "$published" /var /etc /tmp; do
  if touch "$place/write-test" 2>/dev/null; then
    rm -f "$place/write-test"
    echo "$place can still be written: the check would say nothing" >&2
    exit 2
  fi
done

as_server() { # replaces the calling shell, so that a signal reaches the program itself
  exec setpriv --reuid "$user" --regid "$user" --clear-groups --no-new-privs --inh-caps=-all --bounding-set=-all \
    env -i PATH="$PATH" HOME="$data" TMPDIR="$data" DOTNET_EnableDiagnostics=0 ASPNETCORE_ENVIRONMENT="$environment" \
    ASPNETCORE_URLS="http://127.0.0.1:$port" ModelLab__DataFolder="$data" dotnet "$published/ModelLab.Web.dll" "$@"
}

cd "$published"
if (as_server health) >/dev/null 2>&1; then
  echo "something listens on port $port already; choose another with PORT" >&2
  exit 2
fi
as_server </dev/null &
server=$!
trap 'kill -KILL "$server" 2>/dev/null || true' EXIT
healthy=1
for _ in $(seq 60); do
  sleep 1
  kill -0 "$server" 2>/dev/null || break
  if (as_server health); then healthy=0; break; fi
done
echo "files in the data folder:"
find "$data" -type f -printf '  %P (%s bytes, mode %m)\n' | sort
code=0
kill -TERM "$server" 2>/dev/null || true
wait "$server" || code=$?
if ((healthy != 0)); then echo "FAILED: the server did not become healthy" >&2; exit 1; fi
if ((code != 0)); then echo "FAILED: the server ended with code $code" >&2; exit 1; fi
echo "passed: started, healthy and stopped as user $user on a read-only file system ($environment)"
INSIDE
