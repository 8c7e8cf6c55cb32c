#include "kent_sink.h"

static int stream_write(void *to, const char *text, size_t length)
{
    FILE *stream = (FILE *)to;
    return fwrite(text, 1, length, stream) == length ? 0 : -1;
}

kent_sink kent_sink_stream(FILE *stream)
{
    return (kent_sink){.write = stream_write, .to = stream};
}

kent_status kent_sink_flush(kent_sink sink, kent_text *text)
{
    if (text->failed) return KENT_E_NOMEM;
    if (text->length == 0) return KENT_OK;
    if (sink.write(sink.to, text->s, text->length) != 0) return KENT_E_IO;
    kent_text_reset(text);
    return KENT_OK;
}
