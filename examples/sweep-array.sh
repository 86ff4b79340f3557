#!/bin/sh
# The same as a job array of a batch system (Slurm; others differ in the name of the variable only):
#   sbatch --array=1-40 --requeue sweep-array.sh
# and when all have ended:
#   looptally gather slice-*.csv --out table.csv
# A job that is stopped and started again goes on where it was: --resume.
#SBATCH --cpus-per-task=1
set -eu
slice=${SLURM_ARRAY_TASK_ID:?start it as a job array}
slices=${SLURM_ARRAY_TASK_COUNT:?start it as a job array}
looptally sweep loop.yaml \
  --over 'condenser.temperature=-25 degC..10 degC:400' --over 'purge.fractions.bleed=0.5 %..10 %:400 log' \
  --part "$slice/$slices" --workers 1 --resume --quiet --out "slice-$slice.csv"
