# How the estimates scatter under both fractions, and the value to decide at.
# Reads: from, studies at the expected fraction, studies at the other one.
tail = outside > 0.25 ? sprintf(" (not shown: %.1f %% of studies)", outside) : ""
set xlabel estimate_label.tail
set ylabel share_label
set xrange [low:high]
set yrange [0:*]
set offsets 0, 0, graph 0.05, 0
unset grid
two = against_label ne ""
decide = critical_label ne ""
near = within_label ne ""

if (near) {
    set object 1 rectangle from expect - within, graph 0 to expect + within, graph 1 behind fillcolor rgb "#eeeeee" fillstyle solid noborder
}
if (decide) {
    set arrow 1 from critical, graph 0 to critical, graph 1 nohead front linecolor rgb black linewidth 1.8 dashtype 2
}

plot for [k=1:near] NaN with boxes linecolor rgb "#eeeeee" fillstyle solid border rgb grey title within_label, \
     for [k=1:two] input using 1:3 with fillsteps linecolor rgb orange fillstyle transparent solid 0.35 noborder, \
     input using 1:2 with fillsteps linecolor rgb blue fillstyle transparent solid 0.25 noborder, \
     for [k=1:two] input using 1:3 with steps linecolor rgb orange linewidth 2 dashtype 4 title against_label, \
     input using 1:2 with steps linecolor rgb blue linewidth 2 title expect_label, \
     for [k=1:decide] NaN with lines linecolor rgb black linewidth 1.8 dashtype 2 title critical_label
