using System.Text;

namespace Pairwright.Runner.Execution;

/// <summary>The beginning and the end of what a process prints on standard error: the runtime says first why it gives up, and then where.</summary>
internal sealed class ErrorText
{
    private const int Most = 4000;
    private readonly Lock _gate = new();
    private readonly StringBuilder _first = new();
    private readonly StringBuilder _last = new();

    public void Add(string text)
    {
        lock (_gate)
        {
            var fits = Math.Min(text.Length, Most - _first.Length);
            _first.Append(text, 0, fits);
            _last.Append(text, fits, text.Length - fits);
            if (_last.Length > 2 * Most)
            {
                _last.Remove(0, _last.Length - Most);
            }
        }
    }

    public override string ToString()
    {
        lock (_gate)
        {
            return $"{_first}{_last}";
        }
    }
}
