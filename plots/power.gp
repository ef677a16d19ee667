# How often the plan calls a polymer different, over what it truly holds.
# Reads: true fraction, called different, its standard error.
set xlabel "true head-to-head fraction / %"
set ylabel reach_label
set yrange [0:104]
set ytics 20
set arrow 1 from expect, graph 0 to expect, graph 1 nohead back linecolor rgb grey linewidth 1 dashtype 3
set arrow 2 from against, graph 0 to against, graph 1 nohead back linecolor rgb grey linewidth 1 dashtype 3
set label 1 sprintf(" %g %%", expect) at expect, graph 0.05 left textcolor rgb grey
set label 2 sprintf(" %g %%", against) at against, graph 0.96 left textcolor rgb grey
plot bar with lines linecolor rgb black linewidth 1.5 dashtype 2 title sprintf("asked: %g %%", bar), \
     input using 1:2:3 with yerrorbars pointtype 7 pointsize 0.6 linecolor rgb blue notitle, \
     input using 1:2 with lines linecolor rgb blue linewidth 2 title "the plan"
