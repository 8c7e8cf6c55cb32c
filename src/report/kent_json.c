#include "kent_json.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

/* ---- writing --------------------------------------------------------------------- */

void kent_json_put_text(kent_writer *w, const char *text)
{
    if (w->status) return;
    if (w->sink.write(w->sink.to, text, strlen(text)) != 0) w->status = KENT_E_IO;
}

static int dump_piece(const char *buffer, size_t size, void *data)
{
    const kent_writer *w = data;
    return w->sink.write(w->sink.to, buffer, size);
}

/* Writes and lets go of value; NULL: it could not be made. */
void kent_json_put(kent_writer *w, json_t *value)
{
    const size_t flags = JSON_REAL_PRECISION(17) | JSON_ENCODE_ANY;
    if (!w->status && !value) w->status = KENT_E_NOMEM;
    if (!w->status && json_dump_callback(value, dump_piece, w, flags) != 0) {
        w->status = KENT_E_IO;
    }
    json_decref(value);
}

void kent_json_open_list(kent_writer *w, const char *head)
{
    kent_json_put_text(w, head);
    w->listed = false;
}

void kent_json_put_element(kent_writer *w, json_t *value)
{
    kent_json_put_text(w, w->listed ? ",\n" : "\n");
    kent_json_put(w, value);
    w->listed = true;
}

/* ---- values ---------------------------------------------------------------------- */

json_t *kent_json_real(double value)
{
    return isfinite(value) ? json_real(value) : json_null();
}

json_t *kent_json_count(size_t value) { return json_integer((json_int_t)value); }

/* Text of a case need not be UTF-8: then its bytes beyond ASCII become '?'. */
json_t *kent_json_words(const char *text)
{
    json_t *value = json_string(text);
    if (value) return value;
    char *plain = kent_copy_text(text);
    if (!plain) return NULL;
    for (char *s = plain; *s != '\0'; s++) {
        if ((unsigned char)*s >= 0x80) *s = '?';
    }
    value = json_string(plain);
    free(plain);
    return value;
}

kent_object kent_object_new(void)
{
    json_t *json = json_object();
    return (kent_object){json, json != NULL};
}

/* Keeps value, even where it fails. */
void kent_object_set(kent_object *o, const char *key, json_t *value)
{
    if (json_object_set_new(o->json, key, value) != 0) o->ok = false;
}

json_t *kent_object_done(kent_object o)
{
    if (o.ok) return o.json;
    json_decref(o.json);
    return NULL;
}

kent_object kent_list_new(void)
{
    json_t *json = json_array();
    return (kent_object){json, json != NULL};
}

void kent_list_append(kent_object *list, json_t *value)
{
    if (json_array_append_new(list->json, value) != 0) list->ok = false;
}

/* [x, y, z]; null where it is not known. */
json_t *kent_json_vector(kent_vec3 v)
{
    if (!isfinite(kent_vec3_length(v))) return json_null();
    kent_object list = kent_list_new();
    kent_list_append(&list, kent_json_real(v.x));
    kent_list_append(&list, kent_json_real(v.y));
    kent_list_append(&list, kent_json_real(v.z));
    return kent_object_done(list);
}

json_t *kent_json_notes(const kent_notes *notes)
{
    kent_object list = kent_list_new();
    for (size_t i = 0; i < notes->count; i++) {
        kent_list_append(&list, kent_json_words(notes->text[i]));
    }
    return kent_object_done(list);
}

json_t *kent_json_grave(const kent_notes *notes)
{
    kent_object list = kent_list_new();
    for (size_t i = 0; i < notes->count; i++) {
        if (notes->grave[i]) kent_list_append(&list, kent_json_words(notes->text[i]));
    }
    return kent_object_done(list);
}
