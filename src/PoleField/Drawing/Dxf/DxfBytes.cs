using System.Text;

namespace PoleField.Drawing;

/// <summary>The bytes of a drawing through a window that moves over the stream; UTF-16 arrives as UTF-8.</summary>
internal sealed class DxfBytes
{
    private const int FirstWindow = 1 << 16;

    private readonly Stream _stream;
    private readonly DxfReport _report;
    private readonly long _limit;
    private byte[] _window = new byte[FirstWindow];
    private int _at;
    private int _end;
    private long _before;
    private long _read;
    private bool _exhausted;
    private Decoder? _utf16;
    private byte[] _raw = [];

    public DxfBytes(Stream stream, DxfReport report, long limit)
    {
        _stream = stream;
        _report = report;
        _limit = limit;
        Need(4);
        DetectUtf16();
        if (Ahead is [0xEF, 0xBB, 0xBF, ..])
        {
            HasMark = true;
            Skip(3);
        }
    }

    /// <summary>True when the file is UTF-16 or begins with the mark of UTF-8.</summary>
    public bool HasMark { get; private set; }

    /// <summary>What is in the window and not yet consumed.</summary>
    public ReadOnlySpan<byte> Ahead => _window.AsSpan(_at, _end - _at);

    /// <summary>Bytes consumed so far.</summary>
    public long Position => _before + _at;

    /// <summary>Consumes bytes of the window.</summary>
    public void Skip(int count) => _at += count;

    /// <summary>Makes at least so many bytes available; false when the file ends before.</summary>
    public bool Need(int count)
    {
        while (_end - _at < count)
        {
            if (_exhausted)
            {
                return false;
            }

            if (_at > 0)
            {
                _window.AsSpan(_at, _end - _at).CopyTo(_window);
                _before += _at;
                _end -= _at;
                _at = 0;
            }

            // A decoded block needs room for three bytes of UTF-8 per UTF-16 unit.
            if (_window.Length - _end < FirstWindow / 2)
            {
                Array.Resize(ref _window, 2 * _window.Length);
            }

            Fill();
        }

        return true;
    }

    private void Fill()
    {
        int got;
        if (_utf16 is null)
        {
            got = _stream.Read(_window, _end, _window.Length - _end);
            _end += got;
        }
        else
        {
            got = _stream.Read(_raw, 0, _raw.Length);
            Decode(_raw.AsSpan(0, got), got == 0);
        }

        _exhausted = got == 0;
        Count(got);
    }

    private void Count(int got)
    {
        _read += got;
        if (_read > _limit)
        {
            throw _report.Stop(
                "limit",
                FormattableString.Invariant($"The file is larger than {_limit} bytes."),
                "Draw the magnet's cross-section in a file of its own.");
        }
    }

    private void DetectUtf16()
    {
        Encoding? encoding = Ahead switch
        {
            [0xFF, 0xFE, ..] or [not 0, 0, not 0, 0, ..] => Encoding.Unicode,
            [0xFE, 0xFF, ..] or [0, not 0, 0, not 0, ..] => Encoding.BigEndianUnicode,
            _ => null,
        };
        if (encoding is null)
        {
            return;
        }

        HasMark = true;
        byte[] first = Ahead.ToArray();
        _utf16 = encoding.GetDecoder();
        _raw = new byte[FirstWindow / 8];
        _at = _end = 0;
        Array.Resize(ref _window, 4 * FirstWindow);
        Decode(first, last: false);
    }

    private void Decode(ReadOnlySpan<byte> raw, bool last)
    {
        char[] text = new char[(raw.Length / 2) + 2];
        int count = _utf16!.GetChars(raw, text, last);
        _end += Encoding.UTF8.GetBytes(text.AsSpan(0, count), _window.AsSpan(_end));
    }
}
