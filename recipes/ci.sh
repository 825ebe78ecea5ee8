#!/bin/sh
# Any CI system: fails when a functional is worse than recorded, and leaves JUnit XML for its report of tests.
set -eu
npm ci
npx rungcheck vet --against rungcheck-state.json --write junit=rungcheck.xml
