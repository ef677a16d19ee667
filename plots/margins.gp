# How the figure falls with each condition, one panel each.
# Reads: panel, condition, what (up, down: values looked at; plan; last), value, figure.
# Of each panel k: label_k, log_k (0 or 1), low_k, high_k.
columns = 3
lines = int((panels + columns - 1) / columns)
top = 1 - 62.0 / height
set multiplot layout lines, columns margins screen 0.125, screen 0.98, screen 84.0 / height, screen top spacing screen 0.05, screen 92.0 / height
set key off
set yrange [lowest:104]
set ytics 20
set offsets 0, 0, 0, 0
is(k, what) = column(1) == k && strcol(3) eq what ? column(4) : NaN

# A step of 1, 2 or 5 times a power of ten that gives two to five steps.
power_of_ten(x) = 10 ** floor(log10(x))
round_up(x) = (x <= 1 ? 1 : x <= 2 ? 2 : x <= 5 ? 5 : 10)
step(span) = round_up(span / 4 / power_of_ten(span / 4)) * power_of_ten(span / 4)

# A long label goes on in a second line.
cut(s, n) = n < 1 ? strlen(s) : s[n:n] eq " " ? n : cut(s, n - 1)
wrapped(s) = strlen(s) <= 25 ? s : s[1:cut(s, 25) - 1]."\n".s[cut(s, 25) + 1:*]

do for [k=1:panels] {
    from = 1.0 * value(sprintf("low_%d", k)) # never whole numbers, whose quotients would be whole
    to = 1.0 * value(sprintf("high_%d", k))
    if (value(sprintf("log_%d", k)) > 0) {
        decades = log10(to / from)
        set logscale x
        set xtics () nomirror
        do for [d=int(floor(log10(from))):int(ceil(log10(to)))] {
            do for [m=1:9] {
                tic = m * 10.0 ** d
                wanted = m == 1 || (decades < 1.6 && (m == 2 || m == 5)) || (decades >= 1.6 && decades < 2.6 && m == 3)
                if (wanted && tic >= 0.999 * from && tic <= 1.001 * to) { set xtics add (sprintf("%g", tic) tic) }
            }
        }
    } else {
        unset logscale x
        set xtics nomirror step(to - from)
    }
    room = value(sprintf("log_%d", k)) > 0 ? (to / from) ** 0.06 : 0.06 * (to - from)
    if (value(sprintf("log_%d", k)) > 0) { set xrange [from / room:to * room] } else { set xrange [from - room:to + room] }
    set xlabel wrapped(value(sprintf("label_%d", k))) noenhanced
    set ylabel (k % columns == 1 ? figure_label : "")
    set format y (k % columns == 1 ? "%g" : "")
    plot bar with lines linecolor rgb black linewidth 1.5 dashtype 2, \
         for [way in "up down"] input using (is(k, way)):5 with linespoints pointtype 7 pointsize 0.45 linecolor rgb blue linewidth 1.5, \
         input using (is(k, "last")):(lowest):(0):(104 - lowest) with vectors nohead linecolor rgb vermillion linewidth 1.8 dashtype 4, \
         input using (is(k, "plan")):5 with points pointtype 13 pointsize 1.5 linecolor rgb black, \
         input using (is(k, "plan")):5 with points pointtype 13 pointsize 1.0 linecolor rgb orange
}

# What the signs mean, once for all panels.
set key on at screen 0.54, screen 1 - 8.0 / height center top horizontal maxrows 1
set lmargin at screen 0
set rmargin at screen 1
set bmargin at screen 0
set tmargin at screen 1
unset border
unset tics
unset grid
unset logscale
set xlabel ""
set ylabel ""
set xrange [0:1]
set yrange [0:1]
plot NaN with linespoints pointtype 7 pointsize 0.6 linecolor rgb blue linewidth 1.5 title figure_title, \
     NaN with lines linecolor rgb black linewidth 1.5 dashtype 2 title sprintf("asked: %g %%", bar), \
     NaN with points pointtype 13 pointsize 1.3 linecolor rgb orange title "the plan", \
     NaN with lines linecolor rgb vermillion linewidth 1.8 dashtype 4 title "last that resolves"
unset multiplot
