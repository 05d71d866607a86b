using System.Diagnostics;
using System.IO.Pipes;
using System.Text;
using System.Threading.Channels;

namespace Pairwright.Runner.Execution;

/// <summary>Runs a job in a child process of this same executable: hears what it tells, watches its time and memory, and ends it where it must.</summary>
internal static class ChildProcess
{
    private static readonly TimeSpan Watch = TimeSpan.FromMilliseconds(50);

    /// <param name="job">The cells to run.</param>
    /// <param name="limits">What the child may take.</param>
    /// <param name="hear">Called for each message, one at a time.</param>
    /// <param name="clock">What the time limit is measured with.</param>
    /// <param name="interrupt">Ends the child early.</param>
    /// <returns>How the child ended, after its last message has been heard. What <paramref name="hear"/> throws ends the child and comes back.</returns>
    public static async Task<ChildEnd> RunAsync(CellJob job, RunLimits limits, Action<ChildMessage> hear, TimeProvider clock, CancellationToken interrupt)
    {
        var pipeName = $"pairwright-{Guid.NewGuid():N}";
        await using var pipe = new NamedPipeServerStream(pipeName, PipeDirection.In, 1, PipeTransmissionMode.Byte, PipeOptions.Asynchronous | PipeOptions.CurrentUserOnly);
        using var process = Start(pipeName, limits);
        var errors = new ErrorText();

        // Bounded, so that a child that floods us with outputs waits for us instead of filling our memory.
        var messages = Channel.CreateBounded<ChildMessage>(64);
        var hearing = Task.Run(async () =>
        {
            try
            {
                await foreach (var message in messages.Reader.ReadAllAsync())
                {
                    hear(message);
                }
            }
            catch (Exception fault)
            {
                // Nobody hears any more, so that whoever waits to be heard must not wait for ever.
                messages.Writer.TryComplete(fault);
                throw;
            }
        }, CancellationToken.None);

        var watching = WatchAsync(process, limits, clock, hearing, interrupt);
        var reading = ReadMessagesAsync(pipe, process, messages.Writer);
        var texts = Task.WhenAll(
            ReadTextAsync(process.StandardOutput, "stdout", messages.Writer, null),
            ReadTextAsync(process.StandardError, "stderr", messages.Writer, errors));

        await SendAsync(process, job);
        var kind = await watching;
        await process.WaitForExitAsync(CancellationToken.None);
        await reading;
        // Grandchildren may hold the streams open long after the child has gone.
        await Task.WhenAny(texts, Task.Delay(TimeSpan.FromSeconds(1), CancellationToken.None));
        messages.Writer.TryComplete();
        await hearing;
        return new ChildEnd(kind, process.ExitCode, errors.ToString());
    }

    private static Process Start(string pipeName, RunLimits limits)
    {
        var own = typeof(ChildProcess).Assembly.Location;
        var start = new ProcessStartInfo
        {
            FileName = DotnetHost(),
            RedirectStandardInput = true,
            RedirectStandardOutput = true,
            RedirectStandardError = true,
        };
        start.ArgumentList.Add("exec");
        start.ArgumentList.Add(own);
        start.ArgumentList.Add(HiddenCommand);
        start.ArgumentList.Add(pipeName);
        // A little above the limit that we watch: one huge allocation then fails at once, before it is ever resident.
        start.Environment["DOTNET_GCHeapHardLimit"] = (limits.MemoryBytes + limits.MemoryBytes / 10).ToString("x");
        start.Environment["DOTNET_NOLOGO"] = "1";
        return Process.Start(start) ?? throw new InvalidOperationException("The child process could not be started.");
    }

    /// <summary>The name of the command by which this executable plays the child; not shown in the help.</summary>
    public const string HiddenCommand = "cells";

    private static string DotnetHost() =>
        Path.GetFileNameWithoutExtension(Environment.ProcessPath) == "dotnet" ? Environment.ProcessPath! : "dotnet";

    private static async Task SendAsync(Process process, CellJob job)
    {
        try
        {
            // The stream stays open: when it closes, the child knows that we are gone, and goes too.
            await process.StandardInput.WriteLineAsync(job.ToLine());
            await process.StandardInput.FlushAsync();
        }
        catch (IOException)
        {
            // The child died before it read its job; its exit code tells that story.
        }
    }

    private static async Task<ChildEndKind> WatchAsync(Process process, RunLimits limits, TimeProvider clock, Task hearing, CancellationToken interrupt)
    {
        var start = clock.GetTimestamp();
        while (!process.HasExited)
        {
            ChildEndKind? reason =
                interrupt.IsCancellationRequested || hearing.IsFaulted ? ChildEndKind.Interrupted
                : clock.GetElapsedTime(start) >= limits.Time ? ChildEndKind.OutOfTime
                : ResidentBytes(process) > limits.MemoryBytes ? ChildEndKind.OutOfMemory
                : null;
            if (reason is { } why)
            {
                End(process);
                return why;
            }

            // Not cancelled by the interruption: the next round sees that.
            await Task.WhenAny(process.WaitForExitAsync(CancellationToken.None), Task.Delay(Watch, CancellationToken.None));
        }
        return ChildEndKind.Left;
    }

    private static long ResidentBytes(Process process)
    {
        try
        {
            process.Refresh();
            return process.WorkingSet64;
        }
        catch (InvalidOperationException)
        {
            return 0;
        }
    }

    private static void End(Process process)
    {
        try
        {
            process.Kill(entireProcessTree: true);
        }
        catch (Exception gone) when (gone is InvalidOperationException or System.ComponentModel.Win32Exception or AggregateException)
        {
            // It ended by itself in between.
        }
    }

    private static async Task ReadMessagesAsync(NamedPipeServerStream pipe, Process process, ChannelWriter<ChildMessage> messages)
    {
        using var gone = new CancellationTokenSource();
        var connecting = pipe.WaitForConnectionAsync(gone.Token);
        if (await Task.WhenAny(connecting, process.WaitForExitAsync(CancellationToken.None)) != connecting)
        {
            await gone.CancelAsync();
            return;
        }

        using var lines = new StreamReader(pipe, new UTF8Encoding(false));
        while (await lines.ReadLineAsync(CancellationToken.None) is { } line)
        {
            ChildMessage? message;
            try
            {
                message = ChildMessage.FromLine(line);
            }
            catch (System.Text.Json.JsonException)
            {
                // Half a line: the child was ended while it wrote.
                continue;
            }
            if (message is not null && !await TryTellAsync(messages, message))
            {
                return;
            }
        }
    }

    /// <summary>What native libraries and the runtime itself print reaches us here; a cell's own text comes as messages.</summary>
    private static async Task ReadTextAsync(StreamReader reader, string name, ChannelWriter<ChildMessage> messages, ErrorText? errors)
    {
        var buffer = new char[4096];
        int count;
        while ((count = await reader.ReadAsync(buffer)) > 0)
        {
            var text = new string(buffer, 0, count);
            errors?.Add(text);
            if (!await TryTellAsync(messages, new ChildMessage { Kind = ChildMessageKind.Stream, Stream = name, Text = text }))
            {
                return;
            }
        }
    }

    /// <returns>False where nobody hears any more.</returns>
    private static async Task<bool> TryTellAsync(ChannelWriter<ChildMessage> messages, ChildMessage message)
    {
        try
        {
            await messages.WriteAsync(message, CancellationToken.None);
            return true;
        }
        catch (ChannelClosedException)
        {
            return false;
        }
    }
}
