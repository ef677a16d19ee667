# Which error source is behind how much of the variance: by itself (first
# order) and with all it takes part in (total), with Monte Carlo errors.
# Reads: source, first, its error, total, its error; of `rows` of them.
set xlabel "share of the variance / %"
set xrange [left:*]
set yrange [0.6 - rows:0.6]
set ytics scale 0
set grid noytics
set offsets 0, graph 0.04, 0, 0
set key maxrows 1
set style fill solid 1 noborder
low(x) = x < 0 ? x : 0
high(x) = x > 0 ? x : 0
plot input every ::0::(rows - 1) using 2:(-$0 + 0.19):(low($2)):(high($2)):(-$0 + 0.04):(-$0 + 0.34):yticlabels(1) with boxxyerror linecolor rgb sky title "by itself (first order)", \
     input every ::0::(rows - 1) using 4:(-$0 - 0.19):(low($4)):(high($4)):(-$0 - 0.34):(-$0 - 0.04) with boxxyerror linecolor rgb orange linewidth 1.5 fillstyle solid 0.25 border title "with all it takes part in (total)", \
     input every ::0::(rows - 1) using 2:(-$0 + 0.19):3 with xerrorbars pointtype -1 linecolor rgb black linewidth 1.2, \
     input every ::0::(rows - 1) using 4:(-$0 - 0.19):5 with xerrorbars pointtype -1 linecolor rgb black linewidth 1.2
