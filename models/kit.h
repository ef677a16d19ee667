/* The built-in kit, models/kit.yaml, as the program carries it; the Makefile
 * writes the definitions.  A zero that the size does not count stands behind
 * the last byte. */
#ifndef VICINAL_MODELS_KIT_H
#define VICINAL_MODELS_KIT_H

#include <stddef.h>

extern const unsigned char vicinal_kit_yaml[];
extern const size_t vicinal_kit_yaml_size;

#endif
