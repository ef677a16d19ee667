# What every plan costs against what it reaches; the bar that is asked is a
# line. Reads: index, status, cost, reached, studies.
set xlabel cost_label
set ylabel reach_label
stats input using 3 name "cost" nooutput
stats input using 4 nooutput
lowest = STATS_min < bar ? STATS_min : bar - 1
bottom = lowest < 0 ? 0 : 20 * floor(lowest / 20)
room = 0.03 * (100 - bottom)
set yrange [bottom - room:100 + room]
set ytics bottom, bottom < 60 ? 20 : 5, 100
if (cost_max - cost_min < 0.02 * cost_max) { set xrange [0.95 * cost_min:1.05 * cost_max] }
set offsets graph 0.04, graph 0.04, 0, 0

set arrow 1 from graph 0, first bar to graph 1, first bar nohead front linecolor rgb black linewidth 1.5 dashtype 2

of(status) = strcol(2) eq status ? column(3) : NaN

plot NaN with lines linecolor rgb black linewidth 1.5 dashtype 2 title sprintf("asked: %g %%", bar), \
     for [k=1:failing > 0] input using (of("fails")):4 with points pointtype 6 pointsize 0.5 linewidth 1.2 linecolor rgb grey title "fails", \
     for [k=1:dear > 0] input using (of("too dear")):4 with points pointtype 4 pointsize 0.5 linewidth 1 linecolor rgb orange title "too dear", \
     for [k=1:undecided > 0] input using (of("undecided")):4 with points pointtype 8 pointsize 0.7 linewidth 1 linecolor rgb green title "undecided", \
     for [k=1:resolving > 0] input using (of("resolves")):4 with points pointtype 7 pointsize 0.5 linecolor rgb blue title "resolves", \
     input using (of(mark)):4 with points pointtype 13 pointsize 1.5 linecolor rgb black notitle, \
     input using (of(mark)):4 with points pointtype 13 pointsize 1.0 linecolor rgb vermillion title mark
