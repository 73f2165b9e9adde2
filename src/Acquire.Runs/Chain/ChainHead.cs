using System.Buffers;
using System.Security.Cryptography;

namespace Acquire.Runs.Chain;

/// <summary>The running head of the chain: head = SHA-256(previous head, bytes of the block). Blocks close by content, never by commit.</summary>
internal sealed class ChainHead
{
    /// <summary>Readings after which a block closes by itself.</summary>
    public const int ReadingsPerBlock = 1024;

    private const int HeadBytes = 32;
    private readonly ArrayBufferWriter<byte> _block = new(64 * 1024);

    public ChainHead() => Restart(new byte[HeadBytes]);

    /// <summary>The bytes of the open block; records are added here.</summary>
    public ArrayBufferWriter<byte> Block => _block;

    /// <summary>The head of the last closed block, hex.</summary>
    public string Hex { get; private set; } = new('0', 2 * HeadBytes);

    /// <summary>Closes the open block and returns the new head, hex.</summary>
    public string Close()
    {
        var head = SHA256.HashData(_block.WrittenSpan);
        Restart(head);
        Hex = Convert.ToHexStringLower(head);
        return Hex;
    }

    /// <summary>The state to come back to when a transaction is rolled back.</summary>
    public (string Hex, byte[] Block) Save() => (Hex, _block.WrittenSpan.ToArray());

    /// <summary>Comes back to a saved state.</summary>
    public void Restore((string Hex, byte[] Block) saved)
    {
        Hex = saved.Hex;
        _block.ResetWrittenCount();
        saved.Block.CopyTo(_block.GetSpan(saved.Block.Length));
        _block.Advance(saved.Block.Length);
    }

    private void Restart(ReadOnlySpan<byte> head)
    {
        _block.ResetWrittenCount();
        head.CopyTo(_block.GetSpan(HeadBytes));
        _block.Advance(HeadBytes);
    }
}
