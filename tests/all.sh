#!/usr/bin/env bash
# Brings what cargo does not (an OpenSSH client, for the checks against the stock verifier), then runs every test.
set -euo pipefail
cd "$(dirname "$0")/.."
if ! command -v ssh-keygen >/dev/null || ! command -v sha256sum >/dev/null; then
    apt-get update -q && apt-get install -qy openssh-client coreutils
fi
cargo test --locked
