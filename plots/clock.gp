# One simulated study: efflux times over their nominal ones above, temperatures
# of bath and liquid below, both along the clock of the bench (days in a row).
# Reads: solution, clock, time over nominal less one, bath, liquid.
set multiplot layout 2, 1 title "One simulated study along the clock" noenhanced
set lmargin 11
set format x ""
set xlabel ""
set bmargin 1
set ylabel "time over nominal - 1 / %"
set offsets 0, 0, graph 0.1, graph 0.1
set key above horizontal maxrows 1
of(name) = strcol(1) eq name ? $2 : NaN
plot input using (of("water")):3 with points pointtype 6 pointsize 0.7 linewidth 1.5 linecolor rgb black title "water", \
     for [k=1:blanks > 0] input using (of("blank")):3 with points pointtype 4 pointsize 0.7 linewidth 1.5 linecolor rgb green title "blank", \
     input using (of("intact")):3 with points pointtype 7 pointsize 0.6 linecolor rgb blue title "intact", \
     input using (of("cleaved")):3 with points pointtype 9 pointsize 0.7 linecolor rgb vermillion title "cleaved"
set format x "%g"
set bmargin 3.6
set xlabel "clock of the bench / h"
set ylabel "less the set one / K"
plot input using 2:4 with linespoints pointtype 6 pointsize 0.5 linecolor rgb orange linewidth 1.5 title "bath as the run begins", \
     input using 2:5 with linespoints pointtype 7 pointsize 0.4 linecolor rgb blue linewidth 1.5 dashtype 2 title "liquid, mean over the run"
unset multiplot
