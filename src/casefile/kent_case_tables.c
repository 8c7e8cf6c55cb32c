/* The tables that a case names for its points and pipes. */
#include "kent_case_internal.h"

#include <stdio.h>
#include <string.h>

static kent_status read_table(kent_filling *f, const char *key, const char *group,
                              kent_rows_style style, kent_rows **out, kent_error *err)
{
    char says[320];
    const kent_field *file = kent_record_field(&f->root, key);
    if (!file->text) return KENT_OK;
    (void)snprintf(says, sizeof says, "%s = \"%.255s\"", key, file->text);
    return kent_rows_read(&f->reader, file->text, says,
                          kent_tree_place(f->reader.tree, file->twig), group, style,
                          out, err);
}

kent_status kent_fill_tables(kent_filling *f, kent_error *err)
{
    static const char SEPARATORS[] = {',', ';', '\t'}; /* as the words of the key */
    const size_t before = f->reader.complaints->count;
    kent_rows_style style = {.separator = ','};
    kent_record r;
    if (kent_fill_group(f, &f->root, "tables", &r)) {
        const int separator = kent_record_field(&r, "separator")->index;
        style.decimal_comma = kent_record_field(&r, "decimal")->index == 1;
        if (separator >= 0) style.separator = SEPARATORS[separator];
        if (r.sound && style.decimal_comma && style.separator == ',') {
            kent_record_complain(
                &f->reader, &r, "decimal",
                "with decimal = \"comma\" a comma cannot stand between "
                "cells too; give separator = \"semicolon\" or \"tab\"");
        }
        if (f->reader.complaints->count > before) return KENT_E_INPUT;
    }
    kent_status status =
        read_table(f, "points_file", "point", style, &f->points_table, err);
    const bool go_on = status == KENT_OK || status == KENT_E_INPUT;
    const kent_status second =
        go_on ? read_table(f, "pipes_file", "pipe", style, &f->pipes_table, err)
              : status;
    return status != KENT_OK ? status : second;
}
