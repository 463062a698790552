"""What is told about a kernel: one file for each rule, asked in the order of causes.

One cause, one finding. At each place and argument the first rule of this table that holds is told; the later ones
that would still hold once it is cured are listed under ``then``. Two reasons to stand earlier: nothing else can be
said until this is settled, or curing it cures what stands later.

==  ==========================  ======================================  ==========================================
 1  unresolved-access           nothing is known                        no other rule can speak before
 2  data-dependent-destination  data decides where it goes              its cure, a buffer each, sets a new order
 3  indirect-index              data decides the address                its cure, a copy on chip, sets a new order
 4  guarded-access              data decides whether it happens         no run is certain before
 5  early-exit                  data decides how often it happens       no run is certain before
 6  volatile-access             nothing may join, widen or advance      a better order is of no use before
 7  repeated-address            the order: the address stays            its cure, a register, may leave no access
 8  descending-access           the order: downwards
 9  strided-access              the order: with gaps
10  in-place-update             a load and a store wait for each other  a longer run is of no use before
11  interleaved-accesses        accesses of one direction take turns    a longer run is of no use before
12  short-run                   the order is good, the stretch short
13  partial-record              the burst is good, a part of it unused
14  narrow-port                 the burst is good, its beats narrow     width multiplies what order has won
15  misaligned-run              all is good but where the runs start    a port that is narrow in any case says more
16  few-outstanding             all is good but how many are under way  last: how many follows from all the rest
==  ==========================  ======================================  ==========================================

Five rules speak of the kernel, and beside the others: `shared-port` (what arguments take from each other),
`read-write-turnaround` (what reads and writes do), `oversized-buffers` (what room on chip a port has no use for),
`assumed-size` and `invented-name` (what the rest depends on).
"""

from __future__ import annotations

from beatwise_rules.asking import RULES, Rule, ask, page, rule_names
from beatwise_rules.levels import Thresholds

__all__ = ["RULES", "Rule", "Thresholds", "ask", "page", "rule_names"]
