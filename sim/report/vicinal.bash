# bash completion of vicinal

# The options that a key of `plan:` has in the kit, or by its nature.
_vicinal_options() {
    case $1 in
    material | grade | tube | bath | thermometer | timer)
        "$2" kit --json 2>/dev/null | awk -v list="\"$1s\": [" '
            index($0, list) && /^    "/ { inside = 1; next }
            inside && /^    \]/ { exit }
            inside && /^        "name": / { split($0, part, "\""); print part[4] }'
        ;;
    temperature_record) echo each-run none ;;
    levels_cleaved | fillings_cleaved) echo same ;;
    dilution) echo flasks in-tube ;;
    order) echo sequential shuffled bracketed ;;
    extrapolation) echo huggins kraemer martin common-intercept single-point ;;
    weighting) echo equal c-squared ;;
    density) echo partial-volume neglected ;;
    kinetic_energy) echo corrected neglected ;;
    chain_statistics) echo discrete continuous ;;
    esac
}

# Every key that --set takes, with its section, from the list of keys.
_vicinal_paths() {
    "$1" kit --json 2>/dev/null | awk '
        /^  "keys": / { inside = 1; next }
        inside && /^    "/ { split($0, part, "\""); section = part[2] }
        inside && /^        "key": / {
            split($0, part, "\"")
            if (section == "top") print part[4] "="
            else if (section !~ /^kit/) print section "." part[4] "="
        }'
}

_vicinal_scenarios() {
    compopt -o filenames 2>/dev/null
    mapfile -t COMPREPLY < <(compgen -d -- "$1"; compgen -f -X '!*.yaml' -- "$1"; compgen -f -X '!*.yml' -- "$1")
}

_vicinal() {
    local verbs="plan trial budget margin sheet kit check"
    local options="--out --json --set --pick --seed --studies --threads --yes --quiet --help --version"
    local keys="material grade tube bath thermometer temperature_record timer top top_cleaved lowest levels
        levels_cleaved dilution preparations fillings fillings_cleaved runs water_fillings water_runs order
        extrapolation weighting density kinetic_energy chain_statistics"
    local line=${COMP_LINE:0:COMP_POINT} word before program=${COMP_WORDS[0]} verb="" i
    # The word at the cursor with its `=`, which bash takes apart.
    word=${line##*[[:space:]]}
    before=${line%"$word"}
    before=${before%"${before##*[![:space:]]}"}
    before=${before##*[[:space:]]}
    COMPREPLY=()
    for ((i = 1; i < COMP_CWORD; i++)); do
        [[ " $verbs " == *" ${COMP_WORDS[i]} "* ]] && verb=${COMP_WORDS[i]} && break
    done
    [[ $verb == trial ]] && options+=" --times --notebooks"

    case $before in
    --out)
        compopt -o filenames 2>/dev/null
        mapfile -t COMPREPLY < <(compgen -d -- "$word")
        return
        ;;
    --times)
        compopt -o filenames 2>/dev/null
        mapfile -t COMPREPLY < <(compgen -f -- "$word")
        return
        ;;
    --seed | --studies | --threads | --notebooks)
        return
        ;;
    --pick)
        if [[ $word == *=* ]]; then
            mapfile -t COMPREPLY < <(compgen -W "$(_vicinal_options "${word%%=*}" "$program")" -- "${word#*=}")
        else
            compopt -o nospace 2>/dev/null
            mapfile -t COMPREPLY < <(compgen -S = -W "$keys" -- "$word")
        fi
        return
        ;;
    --set)
        [[ $word == *=* ]] && return
        compopt -o nospace 2>/dev/null
        mapfile -t COMPREPLY < <(compgen -W "$(_vicinal_paths "$program")" -- "$word")
        return
        ;;
    esac
    if [[ $word == -* ]]; then
        mapfile -t COMPREPLY < <(compgen -W "$options" -- "$word")
    elif [[ -z $verb ]]; then
        mapfile -t COMPREPLY < <(compgen -W "$verbs" -- "$word")
    else
        _vicinal_scenarios "$word"
    fi
}

complete -F _vicinal vicinal
