# vicinal: build, tests, installation.
#
#   make            the program, build/release/vicinal
#   make demo       set-up, build, and the main example planned
#   make check      set-up, then every test; ONLY="water /cases/" for those whose path has one of the words
#   make lint       the rules of the house (tests/lint/lint)
#   make bench      what it costs to run
#   make bare       demo and check in a fresh Debian 12 (as root)
#   make install    program, man page, completion and scenarios; PREFIX=/usr/local DESTDIR=
#   make clean
#
#   VARIANT=release|debug|san   each in a folder of its own; san: address and undefined-behaviour sanitizers
#   OPENMP=no                   without threads, in build/VARIANT-serial
#   WERROR=yes                  a warning is an error
#   V=1                         whole command lines

VERSION = 0.1.0
VARIANT ?= release
OPENMP  ?= yes
PREFIX  ?= /usr/local
DESTDIR ?=
ONLY    ?= /
JOBS    ?= 2
CC       = gcc
CXX      = g++
PYTHON  ?= /usr/bin/python3
Q        = $(if $(V),,@)

MAKEFLAGS += --no-builtin-rules --no-builtin-variables --no-print-directory
.DELETE_ON_ERROR:
.SECONDARY:
.PHONY: all program tests demo check lint bench install clean bare FORCE
all: program

# ---- how it is compiled ----

ifeq ($(filter $(VARIANT),release debug san),)
$(error VARIANT is release, debug or san, not $(VARIANT))
endif
ifeq ($(filter $(OPENMP),yes no),)
$(error OPENMP is yes or no, not $(OPENMP))
endif

BUILD   = build/$(VARIANT)$(if $(filter no,$(OPENMP)),-serial)
PROGRAM = $(BUILD)/vicinal
LIBRARY = $(BUILD)/libvicinal.a

WARNINGS = -Wall -Wextra -Wpedantic -Wshadow -Wconversion -Wdouble-promotion -Wstrict-prototypes \
           -Wmissing-prototypes -Werror=implicit-function-declaration -Wundef -Wvla -Wformat=2 -Wcast-qual $(if $(filter yes,$(WERROR)),-Werror)
SANITIZERS    = -fsanitize=address,undefined -fno-sanitize-recover=all
FLAGS_release = -O3
FLAGS_debug   = -Og
FLAGS_san     = -O1 -fno-omit-frame-pointer $(SANITIZERS)
OPENMP_yes    = -fopenmp
OPENMP_no     = -Wno-unknown-pragmas

# Asked once, and only when something is compiled: `make clean` needs no library.
packages = $(shell pkg-config $(1) gsl yaml-0.1 jansson || echo libraries-missing)
checked  = $(if $(findstring libraries-missing,$(1)),$(error libraries are missing: .ci/setup build installs them),$(1))
PACKAGE_CFLAGS = $(eval PACKAGE_CFLAGS := $(call checked,$(call packages,--cflags)))$(PACKAGE_CFLAGS)
PACKAGE_LIBS   = $(eval PACKAGE_LIBS := $(call checked,$(call packages,--libs)))$(PACKAGE_LIBS)

CPPFLAGS = -I. -D_POSIX_C_SOURCE=200809L -DVICINAL_VERSION=\"$(VERSION)\" $(PACKAGE_CFLAGS)
FLAGS    = -g -ffp-contract=off $(FLAGS_$(VARIANT)) $(OPENMP_$(OPENMP))
COMPILE  = $(CC) -std=c11 $(FLAGS) $(WARNINGS) $(CPPFLAGS) -MMD -MP
LIBS     = $(PACKAGE_LIBS) -ludunits2 -lcmark-gfm-extensions -lcmark-gfm -lm

# Rewrites the target only when its text changes, so that what depends on it is made again just then.
keep = @mkdir -p $(@D); printf '%s\n' '$(strip $(1))' | cmp -s - $@ || printf '%s\n' '$(strip $(1))' > $@

$(BUILD)/flags: FORCE
	$(call keep,$(COMPILE))
$(BUILD)/members: FORCE
	$(call keep,$(OBJECTS) $(PLOTS))

# ---- the library and the program ----

SOURCES   = $(sort $(wildcard models/*.c sim/*/*.c))
PLOTS     = $(sort $(wildcard plots/*.gp))
GENERATED = $(BUILD)/embedded/kit.o $(BUILD)/embedded/plots.o $(BUILD)/embedded/proposal.o
OBJECTS   = $(SOURCES:%.c=$(BUILD)/obj/%.o)

program: $(PROGRAM)

$(BUILD)/obj/%.o: %.c $(BUILD)/flags
	@mkdir -p $(@D)
	@echo "cc   $<"
	$(Q)$(COMPILE) $(if $(filter tests/%,$<),-Itests/unit) -c $< -o $@

$(LIBRARY): $(OBJECTS) $(GENERATED) $(BUILD)/members
	@rm -f $@
	$(Q)ar qcs $@ $(filter %.o,$^)

$(PROGRAM): $(BUILD)/obj/sim/main.o $(LIBRARY)
	@echo "link $@"
	$(Q)$(CC) $(FLAGS) $^ $(LIBS) -o $@

# Data that travels inside the program: a file as the bytes of a C array, with a zero behind them.
bytes = { od -An -v -tu1 $(1) | sed 's/[0-9][0-9]*/&,/g'; echo '0};'; }

$(BUILD)/embedded/%.o: $(BUILD)/embedded/%.c $(BUILD)/flags
	$(Q)$(COMPILE) -c $< -o $@

$(BUILD)/embedded/kit.c: models/kit.yaml Makefile
	@mkdir -p $(@D)
	@{ echo '#include "models/kit.h"'; \
	   echo 'const unsigned char vicinal_kit_yaml[] = {'; $(call bytes,$<); \
	   echo 'const size_t vicinal_kit_yaml_size = sizeof vicinal_kit_yaml - 1;'; } > $@

$(BUILD)/embedded/plots.c: $(PLOTS) $(BUILD)/members Makefile
	@mkdir -p $(@D)
	@{ echo '#include "sim/report/plots.h"'; n=0; table=; \
	   for file in $(PLOTS); do \
	       echo "static const unsigned char bytes_$$n[] = {"; $(call bytes,$$file); \
	       table="$$table{\"$${file##*/}\", bytes_$$n, sizeof bytes_$$n - 1}, "; n=$$((n + 1)); \
	   done; \
	   echo "const struct plots_file vicinal_plots[] = {$$table{NULL, NULL, 0}};"; \
	   echo "const size_t vicinal_plots_count = $$n;"; } > $@

$(BUILD)/embedded/proposal.c: sim/report/proposal.css sim/report/proposal.js Makefile
	@mkdir -p $(@D)
	@{ echo '#include "sim/report/proposal_html.h"'; \
	   echo 'const unsigned char vicinal_proposal_css[] = {'; $(call bytes,sim/report/proposal.css); \
	   echo 'const unsigned char vicinal_proposal_js[] = {'; $(call bytes,sim/report/proposal.js); } > $@

# ---- tests ----
# tests/unit: every test_*.c (cmocka) and test_*.cpp is a program; what is not called test_ is linked to each of them.

UNIT_C    = $(sort $(shell find tests/unit -name 'test_*.c' 2>/dev/null))
UNIT_CXX  = $(sort $(shell find tests/unit -name 'test_*.cpp' 2>/dev/null))
UNIT_HELP = $(sort $(shell find tests/unit -name '*.c' ! -name 'test_*' 2>/dev/null))
UNIT      = $(UNIT_C:%.c=$(BUILD)/%) $(UNIT_CXX:%.cpp=$(BUILD)/%)
OUTER     = $(wildcard tests/cases/run) $(sort $(wildcard tests/program/test_*.sh tests/*/test_*.py))

TESTS   = $(sort $(foreach word,$(ONLY),$(foreach test,$(UNIT) $(OUTER),$(if $(findstring $(word),$(test)),$(test)))))
# The program without threads, for the tests that compare the two; they find it under this name.
SERIAL  = build/$(VARIANT)-serial/vicinal
export VICINAL_SERIAL = $(SERIAL)
# A sanitizer's report must not look like an exit status of the program.
ifeq ($(VARIANT),san)
ASAN_OPTIONS  ?= detect_leaks=1:exitcode=99
UBSAN_OPTIONS ?= print_stacktrace=1:exitcode=99
export ASAN_OPTIONS UBSAN_OPTIONS
endif

$(BUILD)/tests/%: $(BUILD)/obj/tests/%.o $(UNIT_HELP:%.c=$(BUILD)/obj/%.o) $(LIBRARY)
	@mkdir -p $(@D)
	$(Q)$(CC) $(FLAGS) $^ -lcmocka $(LIBS) -o $@

$(BUILD)/tests/%: tests/%.cpp $(LIBRARY) $(BUILD)/flags
	@mkdir -p $(@D)
	@echo "c++  $<"
	$(Q)$(CXX) -std=c++17 $(FLAGS) -Wall -Wextra $(CPPFLAGS) -Itests/unit -MMD -MP $< $(LIBRARY) $(LIBS) -o $@

# Parallel, unless the command line says how.
SUBMAKE = $(MAKE) $(if $(findstring -j,$(MAKEFLAGS)),,-j$(shell nproc))

tests: $(PROGRAM) $(filter $(BUILD)/%,$(TESTS))
check:
	@.ci/setup check
	@$(SUBMAKE) tests
	$(if $(filter tests/program/% %.py,$(TESTS)),@$(SUBMAKE) OPENMP=no program)
	@PYTHON=$(PYTHON) $(PYTHON) tests/run --jobs $(JOBS) $(PROGRAM) $(TESTS)

lint: $(OBJECTS) $(BUILD)/obj/sim/main.o
	@$(PYTHON) tests/lint/lint . $(BUILD)/obj

BENCHES = $(sort $(wildcard tests/bench/bench_*.c))
bench: $(PROGRAM) $(BENCHES:%.c=$(BUILD)/%)
	@set -e; for bench in $(BENCHES:%.c=$(BUILD)/%); do $$bench; done
	@set -e; for bench in $(sort $(wildcard tests/bench/*.py)); do $(PYTHON) $$bench $(PROGRAM); done

# ---- the rest ----

demo:
	@.ci/setup build
	@$(SUBMAKE) program
	$(PROGRAM) plan scenarios/everyday-grade.yaml

bare:
	@.ci/bare

install: $(PROGRAM)
	install -D -m 755 $(PROGRAM) $(DESTDIR)$(PREFIX)/bin/vicinal
	install -D -m 644 sim/report/vicinal.1 $(DESTDIR)$(PREFIX)/share/man/man1/vicinal.1
	install -D -m 644 sim/report/vicinal.bash $(DESTDIR)$(PREFIX)/share/bash-completion/completions/vicinal
	install -d $(DESTDIR)$(PREFIX)/share/vicinal/scenarios
	install -m 644 $(sort $(wildcard scenarios/*.yaml)) $(DESTDIR)$(PREFIX)/share/vicinal/scenarios

clean:
	rm -rf build

-include $(shell find $(BUILD) -name '*.d' 2>/dev/null)
