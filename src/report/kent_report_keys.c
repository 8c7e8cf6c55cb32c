#include "kent_keys.h"
#include "kent_report.h"
#include "kent_sink.h"

#include <string.h>

static const char TABLE_HEAD[] = "| key | takes | range | default | since | says |\n"
                                 "| --- | --- | --- | --- | --- | --- |\n";

/* `"SI"`, `"US"` */
static void add_words(const char *words, kent_text *out)
{
    bool first = true;
    for (const char *p = words; p;) {
        const size_t length = strcspn(p, "|");
        kent_text_add(out, "%s`\"%.*s\"`", first ? "" : ", ", (int)length, p);
        first = false;
        p = p[length] == '|' ? p + length + 1 : NULL;
    }
}

/* What may stand behind the key, with an example. */
static void add_takes(const kent_key *k, kent_text *out)
{
    const char *example = kent_kind_example(k->kind, KENT_SI);
    switch (k->value) {
    case KENT_VALUE_QUANTITY:
        kent_text_add(out, "%s, `\"%s\"`", kent_kind_word(k->kind), example);
        if (k->words) kent_text_add(out, ", or `\"%s\"`", k->words);
        return;
    case KENT_VALUE_EITHER:
        kent_text_add(out, "a number, or %s, `\"%s\"`", kent_kind_word(k->kind),
                      example);
        return;
    case KENT_VALUE_NUMBER:
        kent_text_add(out, "a number");
        return;
    case KENT_VALUE_COUNT:
        kent_text_add(out, "a whole number");
        return;
    case KENT_VALUE_SWITCH:
        kent_text_add(out, "`true` or `false`");
        return;
    case KENT_VALUE_TEXT:
        kent_text_add(out, "a text");
        return;
    case KENT_VALUE_ID:
        kent_text_add(out, "a name");
        return;
    case KENT_VALUE_REF:
        kent_text_add(out, "the name of %s", kent_key_group_word(k->words));
        return;
    case KENT_VALUE_WORD:
        add_words(k->words, out);
        return;
    case KENT_VALUE_LIST:
        kent_text_add(out, "%s%s",
                      k->words[0] != '\0' ? "a list of groups, each " : "a list",
                      kent_key_group_word(k->words));
        return;
    case KENT_VALUE_GROUP:
        kent_text_add(out, "a group");
        return;
    case KENT_VALUE_STATION:
        kent_text_add(out, "a station, `\"1+198\"`, or a length");
        return;
    case KENT_VALUE_TURN:
        kent_text_add(out, "a turn, `\"45 deg right\"`");
        return;
    case KENT_VALUE_VECTOR:
        kent_text_add(out, "three numbers, `[ 1.0, 0.0, 0.0 ]`");
        return;
    }
}

static void add_row(const kent_key *k, kent_text *out)
{
    char range[80];
    kent_key_range(k, KENT_SI, range, sizeof range);
    kent_text_add(out, "| `%s` | ", k->key);
    add_takes(k, out);
    kent_text_add(out, " | %s | %s | %s | %s |\n", range,
                  k->fallback[0] != '\0' ? k->fallback : "empty", k->since, k->says);
}

kent_status kent_report_keys(kent_sink sink)
{
    kent_text out = {0};
    const char *group = "";
    for (size_t i = 0; i < KENT_KEY_COUNT; i++) {
        const kent_key *k = &KENT_KEYS[i];
        if (strcmp(k->group, group) != 0) {
            group = k->group;
            kent_text_add(&out, "\n### `%s`: %s\n\n%s", group,
                          kent_key_group_word(group), TABLE_HEAD);
        }
        add_row(k, &out);
    }
    const kent_status status = kent_sink_flush(sink, &out);
    kent_text_clear(&out);
    return status;
}
