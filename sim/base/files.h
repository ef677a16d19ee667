/* Whole files or none: everything is written under a temporary name in the
 * same folder and renamed. */
#ifndef VICINAL_BASE_FILES_H
#define VICINAL_BASE_FILES_H

#include <stdbool.h>
#include <stddef.h>
#include <stdio.h>

/* Why a file could not be written, as "PATH: text of the system". */
struct files_failure {
    char text[512];
};

/* A text that grows in memory until it is saved. */
struct files_text {
    FILE *stream; /* write here */
    char *bytes;
    size_t size;
};

/* Make the folder and those above it; one that is there already is left as it
 * is. False: not possible, and `failure` says why. */
bool files_folder(const char *path, struct files_failure *failure);

/* FOLDER/NAME for free(), or NULL without memory. */
char *files_path(const char *folder, const char *name);

/* The temporary name beside `path`, hidden and of this process; for free(). */
char *files_temporary(const char *path);

/* Write `size` bytes to `path`, whole or not at all: an older file stays as
 * it is when anything fails. */
bool files_write(const char *path, const void *bytes, size_t size, struct files_failure *failure);

/* Give a finished temporary file its final name. An empty or missing one is a
 * failure; it is removed then. */
bool files_adopt(const char *temporary, const char *path, struct files_failure *failure);

/* Open a text; false without memory (nothing to close then). */
bool files_text_open(struct files_text *text);

/* Close the stream; the text stands in bytes and size, for files_text_free.
 * False when memory ran out while it was written. */
bool files_text_close(struct files_text *text);
void files_text_free(struct files_text *text);

/* Close the text, write it to FOLDER/NAME and free it. */
bool files_text_save(struct files_text *text, const char *folder, const char *name, struct files_failure *failure);

#endif
