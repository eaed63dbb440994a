# Tables for a network of (10,10) and (17,0) tubes as chains of beads: a file for each of the three
# pairs and index.csv.
#
#   sh examples/tables-network.sh [PROGRAM [FOLDER]]
set -e
program=${1:-build/gapwright}
folder=${2:-network}
"$program" table --tubes "10,10;17,0" --beads --spacing-nm 0.32 --outer-cut-nm 5 \
  --template "$(dirname "$0")/records.template" --output "$folder"
