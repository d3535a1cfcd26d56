"""Reviews a log with Apache Spark: each vessel's rows go, in the order of the log, through one `shadowpin review`.

    spark-submit review.py LOG.csv OUT_FOLDER [PROGRAM] [PARTITIONS]

Rows need only their own vessel's rows, so vessels can be worked anywhere. The log must have a column `vessel` and no line ends within
cells. The output is parts of rows without a header; `header.csv` beside them holds it.
"""

import csv
import shlex
import subprocess
import sys

from pyspark.rdd import portable_hash
from pyspark.sql import SparkSession


def main(log, out, program="shadowpin", partitions="16"):
    spark = SparkSession.builder.appName("compass log review").getOrCreate()
    lines = spark.sparkContext.textFile(log).zipWithIndex()
    header = lines.first()[0].lstrip("\ufeff")
    names = [name.strip().lower() for name in next(csv.reader([header]))]
    vessel = names.index("vessel")

    def keyed(pair):
        line, number = pair
        cells = next(csv.reader([line]))
        return (cells[vessel].strip() if vessel < len(cells) else "", number), line

    rows = (
        lines.filter(lambda pair: pair[1] > 0 and pair[0].strip())
        .map(keyed)
        # By vessel, and within it as the log has them: that an entry is out of order is itself a finding.
        .repartitionAndSortWithinPartitions(int(partitions), lambda key: portable_hash(key[0]), keyfunc=lambda key: key[1])
        .values()
    )

    # What is written where: a partition's lines to the program's standard input, its lines to the next step.
    command = shlex.join([program, "review", "-", "--header", header, "--exit-zero", "-q"])
    rows.pipe(command, checkCode=True).saveAsTextFile(out)
    titles = subprocess.run([program, "review", "-", "--exit-zero", "-q"], input=(header + "\n").encode(), stdout=subprocess.PIPE, check=True)
    with open(out + ".header.csv", "wb") as file:
        file.write(titles.stdout)
    spark.stop()


if __name__ == "__main__":
    main(*sys.argv[1:])
