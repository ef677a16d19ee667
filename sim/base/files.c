#include "sim/base/files.h"

#include <errno.h>
#include <fcntl.h>
#include <stdlib.h>
#include <string.h>
#include <sys/stat.h>
#include <unistd.h>

static bool fail(struct files_failure *failure, const char *path, int error)
{
    snprintf(failure->text, sizeof failure->text, "%s: %s", path, strerror(error));
    return false;
}

static bool make_one(const char *path, struct files_failure *failure)
{
    struct stat what;
    if (mkdir(path, 0777) == 0)
        return true;
    const int error = errno;
    if (stat(path, &what) == 0)
        return S_ISDIR(what.st_mode) ? true : fail(failure, path, ENOTDIR);
    return fail(failure, path, error);
}

bool files_folder(const char *path, struct files_failure *failure)
{
    char *part = strdup(path);
    bool good = part != NULL;
    if (!good)
        return fail(failure, path, ENOMEM);
    for (char *p = part + 1; good && *part && *p; p++) {
        if (*p != '/')
            continue;
        *p = '\0';
        good = make_one(part, failure);
        *p = '/';
    }
    good = good && make_one(part, failure);
    free(part);
    return good;
}

char *files_path(const char *folder, const char *name)
{
    const size_t size = strlen(folder) + strlen(name) + 2;
    char *path = malloc(size);
    if (path)
        snprintf(path, size, "%s/%s", folder, name);
    return path;
}

char *files_temporary(const char *path)
{
    const char *slash = strrchr(path, '/');
    const char *name = slash ? slash + 1 : path;
    const size_t size = strlen(path) + 40;
    char *temporary = malloc(size);
    if (temporary)
        snprintf(temporary, size, "%.*s.%s.%ld.tmp", (int)(name - path), path, name, (long)getpid());
    return temporary;
}

static bool write_all(int file, const char *bytes, size_t size)
{
    while (size > 0) {
        const ssize_t done = write(file, bytes, size);
        if (done < 0 && errno == EINTR)
            continue;
        if (done < 0)
            return false;
        bytes += done;
        size -= (size_t)done;
    }
    return true;
}

/* Write, flush and close the temporary file; the first error's number, or 0. */
static int fill(const char *temporary, const void *bytes, size_t size)
{
    unlink(temporary); /* what a killed run of the same number left */
    const int file = open(temporary, O_WRONLY | O_CREAT | O_EXCL, 0666);
    if (file < 0)
        return errno;
    int error = write_all(file, bytes, size) ? 0 : errno;
    if (!error && fsync(file) != 0 && errno != EINVAL)
        error = errno;
    if (close(file) != 0 && !error)
        error = errno;
    return error;
}

bool files_write(const char *path, const void *bytes, size_t size, struct files_failure *failure)
{
    char *temporary = files_temporary(path);
    if (!temporary)
        return fail(failure, path, ENOMEM);
    int error = fill(temporary, bytes, size);
    if (!error && rename(temporary, path) != 0)
        error = errno;
    if (error)
        unlink(temporary);
    free(temporary);
    return error ? fail(failure, path, error) : true;
}

bool files_adopt(const char *temporary, const char *path, struct files_failure *failure)
{
    struct stat what;
    int error = 0;
    const int file = open(temporary, O_RDONLY);
    if (file < 0)
        return fail(failure, path, errno);
    if (fstat(file, &what) != 0 || (fsync(file) != 0 && errno != EINVAL))
        error = errno;
    else if (what.st_size == 0)
        error = ENODATA;
    if (close(file) != 0 && !error)
        error = errno;
    if (!error && rename(temporary, path) != 0)
        error = errno;
    if (error)
        unlink(temporary);
    return error ? fail(failure, path, error) : true;
}

bool files_text_open(struct files_text *text)
{
    text->bytes = NULL;
    text->size = 0;
    text->stream = open_memstream(&text->bytes, &text->size);
    return text->stream != NULL;
}

bool files_text_close(struct files_text *text)
{
    const bool good = !ferror(text->stream);
    const bool closed = fclose(text->stream) == 0;
    text->stream = NULL;
    return good && closed;
}

void files_text_free(struct files_text *text)
{
    free(text->bytes);
    text->bytes = NULL;
    text->size = 0;
}

bool files_text_save(struct files_text *text, const char *folder, const char *name, struct files_failure *failure)
{
    const bool whole = files_text_close(text);
    char *path = whole ? files_path(folder, name) : NULL;
    const bool good = path ? files_write(path, text->bytes, text->size, failure) : fail(failure, name, ENOMEM);
    free(path);
    files_text_free(text);
    return good;
}
